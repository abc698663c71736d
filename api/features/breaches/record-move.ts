import { sha256Hex } from '#api/sha256.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding, WaiverModel } from '#shared/checks/model.ts'
import { namesIn } from '#shared/contracts/present-finding.ts'
import type {
  BreachesRepository,
  BreachRow,
  NewBreachEventRow,
  NewBreachRow,
} from './breaches.repository.ts'
import {
  type BreachState,
  type BreachStep,
  type FindingMove,
  type HeadCause,
  stepOf,
} from './breaches.rules.ts'
import { movesAgainstLog, movesBetween } from './head-moves.rules.ts'

/** A move of a system's head, as the one write knows it. */
export interface HeadMove {
  readonly systemId: string
  readonly revision: number
  readonly at: Date
  /** User id; null where the service itself acts. */
  readonly actor: string | null
  /** Null: the whole log is set against `after`, as after a change of the engine. */
  readonly before: Evaluation | null
  readonly after: Evaluation
  readonly cause: HeadCause
  /** In force at `at`, by the database's clock. */
  readonly waivers?: readonly WaiverModel[]
}

export interface LogWrites {
  readonly breaches: BreachesRepository
}

interface Recording {
  readonly newId: NewId
  readonly move: HeadMove
}

interface LoggedStep {
  readonly finding: FindingMove
  readonly logged: BreachRow | undefined
  readonly step: BreachStep
}

/** One row of the log an identity and origin: the head has neither repository nor branch. */
const subjectHashOf = (identity: string) => sha256Hex(`head\n${identity}`)

/** Writes the rows that a move of the head changes, and the events that say so. */
export async function recordMove(
  breaches: BreachesRepository,
  recording: Recording,
): Promise<{ opened: number; resolved: number }> {
  const steps = await stepsOf(breaches, recording.move)
  if (steps.length === 0) return { opened: 0, resolved: 0 }
  const fresh = steps.filter(({ logged }) => logged === undefined)
  let number =
    fresh.length > 0 ? await breaches.takeNumbers(recording.move.systemId, fresh.length) : 0
  const rows = steps.map((step) => {
    const identity = step.logged ?? { id: recording.newId('brc'), number: number++ }
    return rowOf(recording.move, step, identity)
  })
  await breaches.save(rows)
  await breaches.addEvents(
    steps.flatMap((step, at) => eventOf(recording, step, rows[at]?.id ?? '')),
  )
  const counted = (kinds: readonly string[]) =>
    steps.filter(({ step }) => step.event && kinds.includes(step.event.kind)).length
  return { opened: counted(['opened', 'reopened']), resolved: counted(['resolved']) }
}

async function stepsOf(breaches: BreachesRepository, move: HeadMove): Promise<LoggedStep[]> {
  const { systemId, before, after, cause, at } = move
  const waivers = move.waivers ?? []
  const moves =
    before === null
      ? movesAgainstLog(await unresolvedIdentities(breaches, systemId), after, waivers)
      : movesBetween(before, after, waivers)
  if (moves.length === 0) return []
  const hashes = moves.map(({ identity }) => subjectHashOf(identity))
  const rows = await breaches.listBySubjects(systemId, hashes)
  const logged = new Map(rows.map((row) => [row.subjectHash, row]))
  const shift = {
    before: before?.resolved.model ?? null,
    after: after.resolved.model,
    cause,
    at,
  }
  return moves.flatMap((finding, place) => {
    const row = logged.get(hashes[place] ?? '')
    const step = stepOf(finding, row && stateIn(row), shift)
    return step === null ? [] : [{ finding, logged: row, step }]
  })
}

async function unresolvedIdentities(breaches: BreachesRepository, systemId: string) {
  const rows = await breaches.listUnresolvedOfHead(systemId)
  return rows.map(({ identity }) => identity)
}

function stateIn(row: BreachRow): BreachState {
  const { status, gating, basis, ratio, required, lowestRatio, foregroundHex, backgroundHex } = row
  const { waiverId, lastSeenAt, resolvedAt, closingReason } = row
  const measured = { gating, basis, ratio, required, lowestRatio, foregroundHex, backgroundHex }
  return { status, ...measured, waiverId, lastSeenAt, resolvedAt, closingReason }
}

function rowOf(
  move: HeadMove,
  { finding, logged, step }: LoggedStep,
  identity: { readonly id: string; readonly number: number },
): NewBreachRow {
  const { id, number } = identity
  if (logged !== undefined) {
    const seen = finding.after ?? finding.before
    return {
      ...logged,
      ...step.state,
      names: seen ? namesOf(move, seen) : logged.names,
      use: seen?.use ?? logged.use,
    }
  }
  const { after } = finding
  if (after === undefined) throw new TypeError('Only a finding that is there opens an entry')
  return {
    id,
    number,
    systemId: move.systemId,
    subjectHash: subjectHashOf(finding.identity),
    identity: finding.identity,
    origin: 'head',
    foregroundTokenId: after.foreground,
    backgroundTokenId: after.background,
    names: namesOf(move, after),
    kind: after.kind,
    use: after.use,
    themeId: after.theme,
    fgState: after.foregroundState,
    bgState: after.backgroundState,
    firstSeenAt: move.at,
    firstSeenRevision: move.revision,
    ...step.state,
  }
}

function namesOf({ before, after }: HeadMove, finding: Finding): BreachRow['names'] {
  const systems = before === null ? [after.resolved] : [after.resolved, before.resolved]
  const names = namesIn(...systems)
  return {
    foreground: names.tokenName(finding.foreground),
    background: names.tokenName(finding.background),
    theme: names.themeKey(finding.theme),
  }
}

function eventOf(
  { newId, move }: Recording,
  { step }: LoggedStep,
  breachId: string,
): NewBreachEventRow[] {
  if (step.event === null) return []
  return [
    {
      id: newId('bev'),
      breachId,
      ...step.event,
      revision: move.revision,
      actorUserId: move.actor,
      at: move.at,
    },
  ]
}
