import type { NewId } from '#api/platform/ids.ts'
import { sha256Hex } from '#api/sha256.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding } from '#shared/checks/model.ts'
import { namesIn } from '#shared/contracts/present-finding.ts'
import type { BreachesRepository, BreachRow } from './breaches.repository.ts'
import { stepOf } from './breaches.rules.ts'
import {
  inCi,
  loggedAt,
  type LogWriting,
  standInsIn,
  stateIn,
  subjectOf,
  writeSteps,
} from './log-steps.ts'
import type { SightingsRepository } from './sightings.repository.ts'
import {
  branchIn,
  isProtectedBranch,
  movesOfBranch,
  sightedIn,
  type Source,
  type SourceBranch,
} from './sightings.rules.ts'

export interface BranchWrites {
  readonly sightings: SightingsRepository
  readonly breaches: BreachesRepository
  readonly heads: { lock(systemId: string): Promise<{ readonly at: Date } | undefined> }
}

/** A branch that a check is about to be recorded on. */
export interface Watch extends SourceBranch {
  readonly systemId: string
  readonly isProtected: boolean
  /** Of the head's lock, under which the breach log is written; absent where the log does not follow the branch. */
  readonly lockedAt: Date | undefined
}

/** What a check saw. */
export interface Seen {
  readonly checkId: string
  readonly commit: string | null
  /** User id; null for a key, whose name stands with the check. */
  readonly actor: string | null
  /** All that are not `pass`, at least. */
  readonly findings: readonly Finding[]
  readonly evaluation: Evaluation
  readonly passes: boolean
  /** What the head itself falls short in, by identity, with its ratios; asked for where the log follows. */
  readonly onHead: () => ReadonlyMap<string, number>
}

/** A branch that was protected once is followed until its last entry is closed. */
export async function watchBranch(
  { sightings, breaches, heads }: BranchWrites,
  systemId: string,
  source: Source | undefined,
): Promise<Watch | undefined> {
  const branch = branchIn(source)
  if (branch === undefined) return undefined
  const isProtected = isProtectedBranch(await sightings.protectedBranches(systemId), branch)
  const isFollowed =
    isProtected || (await breaches.listUnresolved(systemId, inCi(branch))).length > 0
  const head = isFollowed ? await heads.lock(systemId) : undefined
  return { ...branch, systemId, isProtected, lockedAt: head?.at }
}

interface Recording {
  readonly watch: Watch
  readonly seen: Seen
}

/** @returns what the check says that it logged */
export async function recordBranch(
  { sightings, breaches }: BranchWrites,
  newId: NewId,
  { watch, seen }: Recording,
) {
  const { lockedAt: at, isProtected } = watch
  const sighted = sightedIn(seen.findings)
  await sightings.sweep(watch)
  await sightings.see(rowsOf(sighted, { watch, seen }))
  const logged = { protected: isProtected, seen: sighted.length }
  if (at === undefined) return { ...logged, opened: 0, resolved: 0 }
  const following = { watch, seen, sighted, at }
  const steps = await stepsOf(breaches, following)
  const writing = writingOf(following)
  return { ...logged, ...(await writeSteps(breaches, { newId, writing }, steps)) }
}

interface Following extends Recording {
  readonly sighted: readonly Finding[]
  readonly at: Date
}

async function stepsOf(breaches: BreachesRepository, { watch, seen, sighted, at }: Following) {
  const place = inCi(watch)
  const { systemId, isProtected } = watch
  const { evaluation, passes } = seen
  const unresolved = await breaches.listUnresolved(systemId, place)
  const open = unresolved.map(({ identity }) => identity)
  const moves = movesOfBranch(open, { sighted, evaluation, passes })
  const identities = moves.map(({ identity }) => identity)
  const logged = await loggedAt(breaches, { systemId, place }, identities)
  const after = evaluation.resolved.model
  const standInFor = standInsIn(evaluation)
  const onHead = isProtected ? seen.onHead() : new Map<string, number>()
  return moves.flatMap((finding) => {
    const row = logged.get(finding.identity)
    if (!lasts(row) && !(isProtected && isOwn(finding.after, onHead))) return []
    const shift = { before: null, after, cause: 'edit' as const, at, seenAt: at, standInFor }
    const step = stepOf(finding, row && stateIn(row), shift)
    return step === null ? [] : [{ finding, logged: row, step }]
  })
}

const lasts = (row: BreachRow | undefined) => row !== undefined && row.status !== 'resolved'

/** Whether it is the branch's own: what the head has as well, and no lower, is in the log as the head's. */
const isOwn = (finding: Finding | undefined, onHead: ReadonlyMap<string, number>) =>
  finding !== undefined &&
  finding.ratio < (onHead.get(finding.identity) ?? Number.POSITIVE_INFINITY)

const writingOf = ({ watch, seen, at }: Following): LogWriting => ({
  systemId: watch.systemId,
  place: inCi(watch),
  at,
  revision: null,
  checkId: seen.checkId,
  actor: seen.actor,
  names: namesIn(seen.evaluation.resolved),
})

/** In the order of the key: two checks at once wait for each other instead of ending each other. */
function rowsOf(sighted: readonly Finding[], { watch, seen }: Recording) {
  const { systemId, repository, branch, isProtected } = watch
  const names = namesIn(seen.evaluation.resolved)
  return sighted
    .map((finding) => ({
      systemId,
      repository,
      branch,
      subjectHash: sha256Hex(finding.identity),
      isProtected,
      ...subjectOf(finding, names),
      basis: finding.basis,
      gating: finding.gating,
      ratio: finding.ratio,
      required: finding.required,
      foregroundHex: finding.rendered.foreground,
      backgroundHex: finding.rendered.background,
      lastCommit: seen.commit,
      lastCheckId: seen.checkId,
    }))
    .sort((a, b) => (a.subjectHash < b.subjectHash ? -1 : 1))
}
