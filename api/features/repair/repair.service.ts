import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { JobsService, Report } from '#api/features/jobs/jobs.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding } from '#shared/checks/model.ts'
import { usableOn } from '#shared/checks/usable-on.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import type { listUsableOn } from '#shared/contracts/repair.contract.ts'
import type { ParsedOf } from '#shared/contracts/route.ts'
import { isLongPlan, isLongSearch } from './repair-effort.rules.ts'
import type { MendAsk } from './mend-findings.rules.ts'
import type { RepairAsk, RepairWork } from './repair-work.rules.ts'
import {
  presentMended,
  presentNearest,
  presentPlan,
  presentUsable,
  type Suggestion,
} from './repair.presenter.ts'

/** Where searches run: one after the other, beside what answers requests. */
export interface SearchLane {
  run<Kind extends keyof RepairWork>(
    ask: Extract<RepairAsk, { kind: Kind }>,
    onSpent?: (evaluations: number) => void,
  ): Promise<RepairWork[Kind]['answer']>
}

export interface RepairDeps {
  readonly heads: Pick<HeadsService, 'current'>
  readonly jobs: Pick<JobsService, 'start'>
  /** What somebody waits for does not wait for what goes on as a job. */
  readonly lanes: { readonly prompt: SearchLane; readonly patient: SearchLane }
}

export type { Suggestion }
export type RepairService = ReturnType<typeof createRepairService>

/** What was asked for is found, or goes on as a job. */
export type RepairAnswer<Outcome> =
  | { readonly state: 'done'; readonly outcome: Outcome }
  | { readonly state: 'deferred'; readonly job: JobWire }

interface Asked {
  readonly budget: number
  readonly requestId: string
}

type Search<Outcome extends object> = (
  lane: SearchLane,
  onSpent?: (evaluations: number) => void,
) => Promise<Outcome>

const lockedIn = ({ model }: Head): ReadonlySet<string> =>
  new Set(model.tokens.filter(({ locked }) => locked).map(({ id }) => id))

/** Looks for colours with which what breaches would pass; writes nothing. */
export function createRepairService({ heads, jobs, lanes }: RepairDeps) {
  const answer = createAnswer({ jobs, lanes })
  return {
    async nearest(system: SystemAccess, name: string, asked: Asked) {
      const head = await heads.current(system.id)
      const token = tokenIn(head, name).id
      const { budget } = asked
      const { model } = head.evaluation.resolved
      const options = { token, locked: lockedIn(head), budget }
      const isLong = isLongSearch({ findings: judged(head.evaluation).count, budget })
      return answer(
        async (lane, onSpent) =>
          presentNearest(
            head.evaluation,
            await lane.run<'nearest'>({ kind: 'nearest', model, options }, onSpent),
          ),
        { system, head, kind: 'nearest-passing', asked, isLong },
      )
    },

    async plan(system: SystemAccess, asked: Asked) {
      const head = await heads.current(system.id)
      const { budget } = asked
      const { model } = head.evaluation.resolved
      const options = { locked: lockedIn(head), budget }
      const { count, breaches } = judged(head.evaluation)
      const isLong = isLongPlan(breaches, { model, findings: count, budget })
      return answer(
        async (lane, onSpent) =>
          presentPlan(
            head.evaluation,
            await lane.run<'plan'>({ kind: 'plan', model, options }, onSpent),
          ),
        { system, head, kind: 'repair-plan', asked, isLong },
      )
    },

    /** By fingerprint, the nearest colour for each gating breach of a candidate, or why there is none. */
    async mend(
      head: Head,
      candidate: Evaluation,
      ask: Omit<MendAsk, 'locked' | 'budget' | 'onSpent'>,
    ): Promise<ReadonlyMap<string, Suggestion>> {
      // What passes a check: distinct sets gate nothing, and the candidate may have moved them itself.
      const model = { ...candidate.resolved.model, distinctSets: [] }
      const options = { ...ask, locked: lockedIn(head), budget: MEND_BUDGET }
      return presentMended(
        candidate,
        await lanes.prompt.run<'mend'>({ kind: 'mend', model, options }),
      )
    },

    async usableOn(
      system: SystemAccess,
      { params, query }: Pick<ParsedOf<typeof listUsableOn>, 'params' | 'query'>,
    ) {
      const head = await heads.current(system.id)
      const { theme, state, use } = query
      const usable = usableOn(head.evaluation, tokenIn(head, params.name).id, {
        ...(theme === undefined ? {} : { themes: [themeIn(head, theme)] }),
        ...(state === undefined ? {} : { states: [state] }),
      })
      const wanted = use === undefined ? usable : usable.filter(({ uses }) => uses.includes(use))
      return { items: wanted.map((one) => presentUsable(head.evaluation, one)) }
    },
  }
}

interface SearchRequest {
  readonly system: SystemAccess
  readonly head: Head
  readonly kind: 'nearest-passing' | 'repair-plan'
  readonly asked: Asked
  readonly isLong: boolean
}

/** Runs a search at once, or as a job where it would keep its caller waiting. */
function createAnswer({ jobs, lanes }: Pick<RepairDeps, 'jobs' | 'lanes'>) {
  return async <Outcome extends object>(
    search: Search<Outcome>,
    { system, head, kind, asked, isLong }: SearchRequest,
  ): Promise<RepairAnswer<Outcome>> => {
    if (!isLong) return { state: 'done', outcome: await search(lanes.prompt) }
    const total = head.model.tokens.length
    const { requestId, budget } = asked
    const request = { system, kind, requestId, total, isReadOnly: true }
    const job = await jobs.start(request, async (report) => {
      await report({ read: total, resolved: total, measured: total, evaluations: 0, budget })
      return search(lanes.patient, reporting(report))
    })
    return { state: 'deferred', job }
  }
}

/** A pipeline waits for it: some two seconds. */
const MEND_BUDGET = 40_000

/** How far a search is, one report at a time; a lost job is told when it ends. */
function reporting(report: Report): (evaluations: number) => void {
  let isReporting = false
  return (evaluations) => {
    if (isReporting) return
    isReporting = true
    report({ evaluations })
      .catch(() => undefined)
      .finally(() => {
        isReporting = false
      })
  }
}

function judged(evaluation: Evaluation): { count: number; breaches: readonly Finding[] } {
  const { counts, findings } = verdictOf(evaluation, { include: 'not-pass' })
  return {
    count: Object.values(counts).reduce((sum, count) => sum + count, 0),
    breaches: findings.filter(({ outcome, gating }) => outcome === 'breach' && gating),
  }
}

function tokenIn({ index }: Head, name: string) {
  const token = index.tokensByName.get(name)
  if (token === undefined) throw new AppError('not-found', { detail: `No token ${name}` })
  return token
}

function themeIn({ index }: Head, key: string): string {
  const id = index.names.themeId(key)
  if (id !== undefined) return id
  const detail = `There is no theme ${key}`
  throw new AppError('parameter-invalid', { faults: [{ parameter: 'theme', detail }] })
}
