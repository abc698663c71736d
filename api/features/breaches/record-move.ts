import type { NewId } from '#api/platform/ids.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { WaiverModel } from '#shared/checks/model.ts'
import { namesIn } from '#shared/contracts/present-finding.ts'
import type { BreachesRepository } from './breaches.repository.ts'
import { type HeadCause, stepOf } from './breaches.rules.ts'
import { movesAgainstLog, movesBetween } from './head-moves.rules.ts'
import {
  type Counted,
  type LoggedStep,
  loggedAt,
  ON_HEAD,
  standInsIn,
  stateIn,
  writeSteps,
} from './log-steps.ts'

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

/** Writes the rows that a move of the head changes, and the events that say so. */
export async function recordMove(
  breaches: BreachesRepository,
  { newId, move }: Recording,
): Promise<Counted> {
  const { systemId, revision, at, actor, before, after } = move
  const names = namesIn(after.resolved, ...(before === null ? [] : [before.resolved]))
  const writing = { systemId, place: ON_HEAD, at, revision, checkId: null, actor, names }
  return writeSteps(breaches, { newId, writing }, await stepsOf(breaches, move))
}

async function stepsOf(breaches: BreachesRepository, move: HeadMove): Promise<LoggedStep[]> {
  const { systemId, before, after, cause, at } = move
  const waivers = move.waivers ?? []
  const moves =
    before === null
      ? movesAgainstLog(await unresolvedIdentities(breaches, systemId), after, waivers)
      : movesBetween(before, after, waivers)
  if (moves.length === 0) return []
  const identities = moves.map(({ identity }) => identity)
  const logged = await loggedAt(breaches, { systemId, place: ON_HEAD }, identities)
  const shift = {
    before: before?.resolved.model ?? null,
    after: after.resolved.model,
    cause,
    at,
    standInFor: standInsIn(after),
  }
  return moves.flatMap((finding) => {
    const row = logged.get(finding.identity)
    const step = stepOf(finding, row && stateIn(row), shift)
    return step === null ? [] : [{ finding, logged: row, step }]
  })
}

async function unresolvedIdentities(breaches: BreachesRepository, systemId: string) {
  const rows = await breaches.listUnresolved(systemId, ON_HEAD)
  return rows.map(({ identity }) => identity)
}
