import { stateAt } from './model-graph.ts'
import type { Provenance, StepTaken } from './provenance.ts'
import type { MergedStateRule, MergedThemeRule } from './rule-scopes.ts'

type FromState = Extract<Provenance, { from: 'state-rule' }>
type FromTheme = Extract<Provenance, { from: 'theme-rule' }>

/** Provenances of one pass: most values of a system follow from few rules, and what says the same is one object. */
export interface SharedProvenance {
  readonly byState: Map<MergedStateRule, FromState[]>
  readonly byTheme: Map<MergedThemeRule, FromTheme[]>
}

/** Starts with nothing to share. */
export function createSharedProvenance(): SharedProvenance {
  return { byState: new Map(), byTheme: new Map() }
}

const SIDES = ['preferred', 'opposite', 'roomier'] as const

/** The step of a rule in a state as a small number; what it is taken from is left out. */
function stepAt({ state, step, alphaStep }: FromState): number {
  const taken = step ? 1 + SIDES.indexOf(step.side) * 2 + (step.moved === 'lighter' ? 0 : 1) : 0
  const marks = (step?.clamped ? 1 : 0) + (alphaStep === undefined ? 0 : 2)
  return (stateAt(state) * 7 + taken) * 4 + marks
}

function isSameAim(first: StepTaken | undefined, second: StepTaken | undefined): boolean {
  return first?.reference === second?.reference && first?.direction === second?.direction
}

/** The provenance itself, or the one before it that says the same of a rule. */
export function sharedByState(
  shared: SharedProvenance,
  rule: MergedStateRule,
  provenance: FromState,
): FromState {
  let known = shared.byState.get(rule)
  if (known === undefined) {
    known = []
    shared.byState.set(rule, known)
  }
  const at = stepAt(provenance)
  known[at] ??= provenance
  return isSameAim(known[at].step, provenance.step) ? known[at] : provenance
}

/** The provenance itself, or the one before it that says the same of a rule; what falls short speaks for itself. */
export function sharedByTheme(
  shared: SharedProvenance,
  rule: MergedThemeRule,
  provenance: FromTheme,
): FromTheme {
  if (provenance.short !== undefined) return provenance
  let known = shared.byTheme.get(rule)
  if (known === undefined) {
    known = []
    shared.byTheme.set(rule, known)
  }
  const before = known.find(({ theme }) => theme === provenance.theme)
  if (before === undefined) known.push(provenance)
  return before ?? provenance
}
