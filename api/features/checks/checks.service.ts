import * as z from 'zod'
import type { Caller, SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { Seen, SightingsService } from '#api/features/breaches/sightings.service.ts'
import type { CoverageService } from '#api/features/coverage/coverage.service.ts'
import type { RepairService, Suggestion } from '#api/features/repair/repair.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { decodeCursor, encodeCursor } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Transact } from '#api/repositories.ts'
import { measureDistinctSets } from '#shared/checks/distinct-measure.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding, Verdict } from '#shared/checks/model.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import type { CheckWire, createCheck, listChecks } from '#shared/contracts/checks.contract.ts'
import {
  namesIn,
  presentAdvisory,
  presentDistinctMeasure,
  presentFinding,
} from '#shared/contracts/present-finding.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import { presentCheckSummary } from './checks.presenter.ts'
import type { ChecksReads } from './checks.reads.ts'
import type { CheckRow, NewCheckRow } from './checks.repository.ts'
import { type KeptFindings, packFindings, unpackFindings } from './findings-archive.ts'
import { judgingOf, measureCandidate } from './measure-candidate.rules.ts'

export interface ChecksDeps {
  readonly heads: Pick<HeadsService, 'current'>
  readonly reads: ChecksReads
  readonly repair: Pick<RepairService, 'mend'>
  readonly sightings: Pick<SightingsService, 'watch' | 'record'>
  readonly coverage: Pick<CoverageService, 'observe'>
  readonly transact: Transact<'checks' | 'heads' | 'breaches' | 'sightings' | 'coverage'>
  readonly newId: NewId
}

export type ChecksService = ReturnType<typeof createChecksService>
type Asked = Pick<ParsedOf<typeof createCheck>, 'body' | 'query'>
type ListQuery = ParsedOf<typeof listChecks>['query']

const placeSchema = z.strictObject({ number: z.int().min(1) })

/** Measures candidates against the head, and keeps what came out. */
export function createChecksService(deps: ChecksDeps) {
  const { heads, reads, repair, sightings, coverage, transact, newId } = deps

  async function found(system: SystemAccess, id: string) {
    const row = await reads.find(system.id, id)
    const own = ownKeyOf(system)
    if (row === undefined || (own !== undefined && row.callerKeyId !== own)) {
      throw new AppError('not-found', { detail: `No check ${id}` })
    }
    return row
  }

  return {
    /** Answers a verdict: a candidate that fails is no refusal. */
    async create(system: SystemAccess, { body, query }: Asked): Promise<CheckWire> {
      const head = await heads.current(system.id)
      const measured = measureCandidate(head, body, { exempts: mayExempt(system) })
      if (!measured.ok) {
        const { code, ...options } = measured.refusal
        throw new AppError(code, options)
      }
      const { evaluation, sent } = measured
      const judging = judgingOf(head, { newOnly: body.newOnly, waivers: [] })
      const include = query.findings === 'all' ? 'all' : 'not-pass'
      const verdict = verdictOf(evaluation, { ...judging, include })
      const ask = { ...judging, ...(sent ? { own: sent } : {}) }
      const isMended = query.nearest && verdict.verdict === 'fail'
      const findings = presentFindings(
        verdict,
        evaluation,
        isMended ? await repair.mend(head, evaluation, ask) : undefined,
      )
      const row = {
        ...rowOf(system, { head, verdict, source: body.source }),
        id: newId('chk'),
        findingsGzip: await packFindings(keptOf(findings)),
      }
      await transact(async (repositories) => {
        const { checks } = repositories
        const watch = await sightings.watch(repositories, system.id, body.source)
        const number = await checks.takeNumber(system.id)
        await checks.insert({ ...row, number })
        await coverage.observe(repositories, { system, head, ...observedIn(body) })
        if (watch === undefined) return
        const seen = seenBy(row, { head, verdict, evaluation })
        await checks.setLogged(row.id, await sightings.record(repositories, watch, seen))
      })
      return { ...presentCheckSummary(await found(system, row.id)), ...findings }
    },

    async list(system: SystemAccess, query: ListQuery) {
      const { limit, cursor, ...asked } = query
      const filter = { ...asked, callerKeyId: ownKeyOf(system) }
      const before = decodeCursor(placeSchema, cursor)?.number
      const rows = await reads.list(system.id, filter, { before, limit: limit + 1 })
      const shown = rows.slice(0, limit)
      const body: AnswerOf<typeof listChecks> = { items: shown.map(presentCheckSummary) }
      const last = rows.length > limit ? shown.at(-1) : undefined
      return last === undefined ? { body } : { body, next: encodeCursor({ number: last.number }) }
    },

    async get(system: SystemAccess, id: string): Promise<CheckWire> {
      const row = await found(system, id)
      const packed = await reads.findFindings(system.id, id)
      if (packed === undefined) throw new TypeError('Every check keeps its findings')
      return { ...presentCheckSummary(row), ...(await unpackFindings(packed)) }
    },
  }
}

const observedIn = ({ pairs = [], source }: Asked['body']) => ({ pairs, source })

/** Exemptions are the accessibility lead's own: a key is nobody, whoever owns it. */
const mayExempt = ({ role, caller }: SystemAccess): boolean =>
  caller.kind === 'user' && (role === 'accessibility-lead' || role === 'admin')

/** The key that may read only what it asked for itself. */
const ownKeyOf = ({ ownOnly, caller }: SystemAccess): string | undefined =>
  ownOnly && caller.kind === 'key' ? caller.keyId : undefined

/** Not searched, or not to the end. */
const UNSEARCHED: Suggestion = { unmended: { reason: 'budget' } }

/** @param suggestions by fingerprint, where they were asked for */
function presentFindings(
  verdict: Verdict,
  { resolved }: Evaluation,
  suggestions?: ReadonlyMap<string, Suggestion>,
): KeptFindings {
  const names = namesIn(resolved)
  const suggestionFor = ({ outcome, gating, identity }: Finding): Suggestion =>
    suggestions === undefined || outcome !== 'breach' || !gating
      ? {}
      : (suggestions.get(identity) ?? UNSEARCHED)
  return {
    findings: verdict.findings.map((finding) => ({
      ...presentFinding(finding, names),
      ...suggestionFor(finding),
    })),
    advisories: verdict.advisories.map((advisory) => presentAdvisory(advisory, names)),
    distinctSets: measureDistinctSets(resolved).map((one) => presentDistinctMeasure(one, names)),
  }
}

const keptOf = ({ findings, ...rest }: KeptFindings): KeptFindings => ({
  ...rest,
  findings: findings.filter(({ outcome }) => outcome !== 'pass'),
})

interface Outcome {
  readonly head: Head
  readonly verdict: Verdict
  readonly source: Asked['body']['source']
}

function rowOf({ id, caller }: SystemAccess, { head, verdict, source }: Outcome) {
  const { engine, counts } = verdict
  return {
    systemId: id,
    againstRevision: head.revision,
    releaseId: null,
    ...callerColumns(caller),
    logged: null,
    repository: source?.repository ?? null,
    branch: source?.branch ?? null,
    commitSha: source?.commit ?? null,
    pipelineUrl: source?.pipelineUrl ?? null,
    verdict: verdict.verdict,
    counts,
    engineVersion: engine.version,
    gamutMap: engine.gamutMap,
    ruleSet: engine.ruleSet,
  } satisfies Partial<NewCheckRow>
}

type Kept = Pick<CheckRow, 'id' | 'commitSha' | 'callerUserId' | 'verdict'>

/** What the check leaves of its branch. */
const seenBy = (
  { id, commitSha, callerUserId, verdict: outcome }: Kept,
  { head, verdict, evaluation }: Pick<Outcome, 'head' | 'verdict'> & Pick<Seen, 'evaluation'>,
): Seen => ({
  checkId: id,
  commit: commitSha,
  actor: callerUserId,
  findings: verdict.findings,
  evaluation,
  passes: outcome === 'pass',
  onHead: () => breachRatios(verdictOf(head.evaluation, { include: 'not-pass' })),
})

function callerColumns(caller: Caller): Pick<CheckRow, 'callerUserId' | 'callerKeyId'> {
  return caller.kind === 'key'
    ? { callerUserId: null, callerKeyId: caller.keyId }
    : { callerUserId: caller.userId, callerKeyId: null }
}
