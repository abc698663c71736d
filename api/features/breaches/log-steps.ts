import type { NewId } from '#api/platform/ids.ts'
import { sha256Hex } from '#api/sha256.ts'
import { standInFor } from '#shared/checks/any-of.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding } from '#shared/checks/model.ts'
import { namesIn } from '#shared/contracts/present-finding.ts'
import type { ModelNames } from '#shared/contracts/wire-values.ts'
import type {
  BreachesRepository,
  BreachRow,
  NewBreachEventRow,
  NewBreachRow,
} from './breaches.repository.ts'
import type { BreachState, BreachStep, FindingMove, HeadShift } from './breaches.rules.ts'

/** Where a breach was seen: part of what makes it the same one. */
export type BreachOrigin = Pick<BreachRow, 'origin' | 'repository' | 'branch'>

export const ON_HEAD: BreachOrigin = { origin: 'head', repository: '', branch: '' }

export const inCi = ({ repository, branch }: Omit<BreachOrigin, 'origin'>): BreachOrigin => ({
  origin: 'ci',
  repository,
  branch,
})

/** What entries are written of: a revision of the head, or a check of a pipeline. */
export interface LogWriting {
  readonly systemId: string
  readonly place: BreachOrigin
  readonly at: Date
  readonly revision: number | null
  readonly checkId: string | null
  /** User id; null where nobody acts in person. */
  readonly actor: string | null
  readonly names: ModelNames
}

/** A finding that moves, its entry in the log where it has one, and what becomes of that. */
export interface LoggedStep {
  readonly finding: FindingMove
  readonly logged: BreachRow | undefined
  readonly step: BreachStep
}

export interface Counted {
  readonly opened: number
  readonly resolved: number
}

/** One row of the log an identity and origin. */
export const subjectHashOf = ({ origin, repository, branch }: BreachOrigin, identity: string) =>
  sha256Hex(
    origin === 'head' ? `head\n${identity}` : ['ci', repository, branch, identity].join('\n'),
  )

/** The entries of some identities at one place, by identity. */
export async function loggedAt(
  breaches: Pick<BreachesRepository, 'listBySubjects'>,
  { systemId, place }: Pick<LogWriting, 'systemId' | 'place'>,
  identities: readonly string[],
): Promise<Map<string, BreachRow>> {
  const hashes = identities.map((identity) => subjectHashOf(place, identity))
  const rows = await breaches.listBySubjects(systemId, hashes)
  return new Map(rows.map((row) => [row.identity, row]))
}

/** Writes rows and the events that say so. The caller holds the head's lock. */
export async function writeSteps(
  breaches: BreachesRepository,
  { newId, writing }: { readonly newId: NewId; readonly writing: LogWriting },
  steps: readonly LoggedStep[],
): Promise<Counted> {
  if (steps.length === 0) return { opened: 0, resolved: 0 }
  const fresh = steps.filter(({ logged }) => logged === undefined)
  let number = fresh.length > 0 ? await breaches.takeNumbers(writing.systemId, fresh.length) : 0
  const rows = steps.map((step) =>
    rowOf(writing, step, step.logged ?? { id: newId('brc'), number: number++ }),
  )
  await breaches.save(rows)
  await breaches.addEvents(
    steps.flatMap(({ step }, at) => {
      const breachId = rows[at]?.id
      return step.event === null || breachId === undefined
        ? []
        : eventOf(writing, { ...step.event, id: newId('bev'), breachId })
    }),
  )
  const counted = (...kinds: string[]) =>
    steps.filter(({ step }) => step.event && kinds.includes(step.event.kind)).length
  return { opened: counted('opened', 'reopened'), resolved: counted('resolved') }
}

export function stateIn(row: BreachRow): BreachState {
  const { status, gating, basis, ratio, required, lowestRatio, foregroundHex, backgroundHex } = row
  const { waiverId, lastSeenAt, resolvedAt, closingReason, metBy } = row
  const measured = { gating, basis, ratio, required, lowestRatio, foregroundHex, backgroundHex }
  return { status, ...measured, waiverId, lastSeenAt, resolvedAt, closingReason, metBy }
}

function rowOf(
  { systemId, place, at, revision, names }: LogWriting,
  { finding, logged, step }: LoggedStep,
  { id, number }: Pick<BreachRow, 'id' | 'number'>,
): NewBreachRow {
  const seen = finding.after ?? finding.before
  if (logged !== undefined) {
    const subject = seen ? { names: namesOf(names, seen), use: seen.use } : {}
    return { ...logged, ...step.state, ...subject }
  }
  const { after } = finding
  if (after === undefined) throw new TypeError('Only a finding that is there opens an entry')
  return {
    id,
    number,
    systemId,
    subjectHash: subjectHashOf(place, finding.identity),
    ...place,
    ...subjectOf(after, names),
    firstSeenAt: at,
    firstSeenRevision: revision,
    ...step.state,
  }
}

/** What a finding is about, as rows of the log and of sightings hold it. */
export const subjectOf = (finding: Finding, names: ModelNames) => ({
  identity: finding.identity,
  foregroundTokenId: finding.foreground,
  backgroundTokenId: finding.background,
  names: namesOf(names, finding),
  kind: finding.kind,
  use: finding.use,
  themeId: finding.theme,
  fgState: finding.foregroundState,
  bgState: finding.backgroundState,
})

const namesOf = ({ tokenName, themeKey }: ModelNames, finding: Finding): BreachRow['names'] => ({
  foreground: tokenName(finding.foreground),
  background: tokenName(finding.background),
  theme: themeKey(finding.theme),
})

const eventOf = (
  { revision, checkId, actor, at }: LogWriting,
  event: NewBreachEventRow,
): NewBreachEventRow => ({ ...event, revision, checkId, actorUserId: actor, at })

/** Tells the pair that stands in for one which its group lets pass, as the evaluation has it. */
export function standInsIn(evaluation: Evaluation): NonNullable<HeadShift['standInFor']> {
  const names = namesIn(evaluation.resolved)
  return (finding) => {
    const pair = standInFor(evaluation, finding)
    if (pair === undefined) return null
    const { foreground, background } = pair
    const called = {
      foreground: names.tokenName(foreground),
      background: names.tokenName(background),
    }
    return { foreground, background, names: called }
  }
}
