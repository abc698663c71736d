import { EXEMPTIONS, type Finding, type SystemModel } from '#shared/checks/model.ts'

/** One finding before and after an edit; absent where it was not, or is not, measured. */
export interface FindingMove {
  readonly identity: string
  readonly before?: Finding
  readonly after?: Finding
}

/** What moved the head: an edit, or another engine over the same system. */
export type HeadCause = 'edit' | 'engine'

/** The head on both sides of a move; `before` is absent where the log is set against the head anew. */
export interface HeadShift {
  readonly before: SystemModel | null
  readonly after: SystemModel
  readonly cause: HeadCause
  readonly at: Date
  /** Of a finding that its group lets pass, the pair that meets the requirement in its place. */
  readonly standInFor?: (finding: Finding) => StandIn | null
  /** When a check of a pipeline saw what lasts; absent for the head, where every look would see it. */
  readonly seenAt?: Date
}

/** A pair that stands in for another, by ids, and as its tokens were called then. */
export interface StandIn {
  readonly foreground: string
  readonly background: string
  readonly names: { readonly foreground: string; readonly background: string }
}

export type ClosingReason =
  | 'fixed'
  | 'requirement-changed'
  | 'pair-removed'
  | 'theme-removed'
  | 'exempted'
  | 'engine-changed'

/** What an entry of the log says last; the rest of it never changes. */
export interface BreachState {
  readonly status: 'open' | 'waived' | 'resolved'
  readonly gating: boolean
  readonly basis: 'srgb' | 'p3'
  readonly ratio: number
  readonly required: number
  readonly lowestRatio: number
  readonly foregroundHex: string
  readonly backgroundHex: string
  readonly waiverId: string | null
  readonly lastSeenAt: Date | null
  readonly resolvedAt: Date | null
  readonly closingReason: ClosingReason | null
  readonly metBy: StandIn | null
}

export interface BreachEvent {
  readonly kind: 'opened' | 'worsened' | 'eased' | 'resolved' | 'reopened'
  readonly ratio: number
  readonly required: number
}

export interface BreachStep {
  readonly state: BreachState
  /** Null where the entry is only brought up to date. */
  readonly event: BreachEvent | null
}

/** Whether a finding belongs in the log: it falls short, with or without leave. */
export function fallsShort(finding: Finding | undefined): finding is Finding {
  return finding?.outcome === 'breach' || finding?.outcome === 'waived'
}

/** What a moved finding does to its entry in the log, or null where it leaves the log as it is. */
export function stepOf(
  move: FindingMove,
  logged: BreachState | undefined,
  shift: HeadShift,
): BreachStep | null {
  if (fallsShort(move.after)) return sightingOf(move.after, logged, shift.seenAt ?? null)
  if (logged === undefined || logged.status === 'resolved') return null
  return closingOf(move, logged, shift)
}

function sightingOf(
  finding: Finding,
  logged: BreachState | undefined,
  lastSeenAt: Date | null,
): BreachStep | null {
  const { ratio, required } = finding
  const state: BreachState = {
    status: finding.outcome === 'waived' ? 'waived' : 'open',
    gating: finding.gating,
    basis: finding.basis,
    ratio,
    required,
    lowestRatio: Math.min(ratio, logged?.lowestRatio ?? ratio),
    foregroundHex: finding.rendered.foreground,
    backgroundHex: finding.rendered.background,
    waiverId: finding.waiver?.id ?? null,
    lastSeenAt,
    resolvedAt: null,
    closingReason: null,
    metBy: null,
  }
  if (logged !== undefined && sameState(state, logged)) return null
  const kind = sightingKind(state, logged)
  return { state, event: kind === null ? null : { kind, ratio, required } }
}

function sightingKind(state: BreachState, logged: BreachState | undefined) {
  if (logged === undefined) return 'opened'
  if (logged.status === 'resolved') return 'reopened'
  const moved = state.ratio / state.required - logged.ratio / logged.required
  if (moved === 0) return null
  return moved < 0 ? 'worsened' : 'eased'
}

function sameState(a: BreachState, b: BreachState): boolean {
  const names = Object.keys(a) as (keyof BreachState)[]
  return names.every((name) => a[name] === b[name])
}

function closingOf(move: FindingMove, logged: BreachState, shift: HeadShift): BreachStep {
  const { ratio, required } = move.after ?? logged
  const rendered = move.after?.rendered
  return {
    state: {
      ...logged,
      status: 'resolved',
      ratio,
      required,
      basis: move.after?.basis ?? logged.basis,
      gating: move.after?.gating ?? logged.gating,
      foregroundHex: rendered?.foreground ?? logged.foregroundHex,
      backgroundHex: rendered?.background ?? logged.backgroundHex,
      waiverId: null,
      lastSeenAt: shift.at,
      resolvedAt: shift.at,
      closingReason: closingReason(move, logged, shift),
      metBy: standInOf(move.after, shift),
    },
    event: { kind: 'resolved', ratio, required },
  }
}

const standInOf = (after: Finding | undefined, { standInFor }: HeadShift): StandIn | null =>
  after?.reason === 'any-of' ? (standInFor?.(after) ?? null) : null

/** Why a breach is none any more, judged by what changed. */
export function closingReason(
  { identity, before, after }: FindingMove,
  logged: Pick<BreachState, 'required' | 'basis'>,
  shift: HeadShift,
): ClosingReason {
  if (shift.cause === 'engine') return 'engine-changed'
  if (after === undefined) {
    const theme = before?.theme ?? themeIn(identity)
    return shift.after.themes.some(({ id }) => id === theme) ? 'pair-removed' : 'theme-removed'
  }
  if (isExempted(after)) return 'exempted'
  if (after.reason === 'any-of') return joinedGroup(after, shift) ? 'requirement-changed' : 'fixed'
  if (logged.basis === 'p3' && p3SwitchedOff(shift)) return 'requirement-changed'
  if (after.ratio >= logged.required) return 'fixed'
  return after.outcome === 'exempt' && before?.reason !== 'disabled-floor'
    ? 'exempted'
    : 'requirement-changed'
}

/** Where a breach is known from the log alone: the theme's place in an identity (shared/checks/identity.ts). */
function themeIn(identity: string): string | undefined {
  return identity.split('/').at(-3)
}

function isExempted({ outcome, reason }: Finding): boolean {
  return outcome === 'exempt' && EXEMPTIONS.some((kind) => kind === reason)
}

/** Whether one of the finding's own pairs came into its group, which asks less of it than before. */
function joinedGroup({ pairs }: Finding, { before, after }: HeadShift): boolean {
  const groupsIn = (model: SystemModel | null) =>
    new Map(
      model?.pairs.flatMap(({ id, anyOf }) => (pairs.includes(id) ? [[id, anyOf] as const] : [])),
    )
  const groupsBefore = groupsIn(before)
  return [...groupsIn(after)].some(
    ([id, group]) => groupsBefore.has(id) && groupsBefore.get(id) !== group,
  )
}

/** Where the log alone tells of before, it gated: that is how the entry came by its basis. */
function p3SwitchedOff({ before, after }: HeadShift): boolean {
  const gates = ({ settings }: SystemModel) => settings.p3 && settings.p3Gates
  return (before === null || gates(before)) && !gates(after)
}
