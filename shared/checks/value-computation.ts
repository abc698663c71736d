import { adjusted, toResolvedColor } from './color-arithmetic.ts'
import { type ModelGraph, stateAt } from './model-graph.ts'
import type { State } from './model.ts'
import type { Provenance } from './provenance.ts'
import { type ResolvedCell, type ResolvedColor, STATE_COUNT } from './resolved.ts'
import { type SharedProvenance, sharedByState, sharedByTheme } from './shared-provenance.ts'
import { applyStateRule, type StepDirection, stepDirection } from './state-rule.ts'
import { applyThemeRule, type ThemeSide, type ThemeSpan } from './theme-rule.ts'
import { isKept, matchReferences, type ValuePlace } from './value-edges.ts'
import { referenceAt, type ValuePlan } from './value-plan.ts'

/** What a pass has computed so far. */
export interface ValuePass {
  readonly graph: ModelGraph
  /**
   * By token position, for those that are computed, then by theme position × STATE_COUNT + state position;
   * undefined where not yet computed, or where a value hangs on a missing or cyclic reference.
   */
  readonly rows: readonly ((ResolvedCell | undefined)[] | undefined)[]
  /** Cells of a token that is not computed again. */
  knownRow(token: number): readonly ResolvedCell[]
  /** By token position × themes + theme position. */
  readonly directions: Map<number, StepDirection>
  /** Absent: provenances are not shared. */
  readonly shared?: SharedProvenance
}

/** A value computed before; undefined where it hangs on a missing or cyclic reference. */
function cellAt(
  pass: ValuePass,
  token: number,
  theme: number,
  state: State,
): ResolvedCell | undefined {
  if (token < 0) return undefined
  const row = pass.rows[token] ?? pass.knownRow(token)
  return row[theme * STATE_COUNT + stateAt(state)]
}

function restColor(pass: ValuePass, token: number, theme: number): ResolvedColor | undefined {
  return cellAt(pass, token, theme, 'rest')?.color
}

function follow(
  pass: ValuePass,
  plan: Extract<ValuePlan, { kind: 'follow' }>,
  theme: number,
): ResolvedCell | undefined {
  const position = pass.graph.tokenAt.get(plan.target)
  if (position === undefined) return undefined
  const target = cellAt(pass, position, theme, plan.state)
  if (target === undefined) return undefined
  const { adjustment, state } = plan
  if (adjustment === undefined) {
    const provenance: Provenance = { from: 'alias', token: plan.target, state }
    return { color: target.color, provenance, aliasDepth: target.aliasDepth + 1 }
  }
  const provenance: Provenance = { from: 'derived', token: plan.target, state, adjustment }
  return { color: adjusted(target.color, adjustment), provenance, aliasDepth: 0 }
}

/** A theme's side of a rule; for what the rule does not look at, and so does not wait for, the ground stands in. */
function sideOf(
  pass: ValuePass,
  theme: number,
  looksAt: { readonly ink: boolean; readonly reference: number | undefined },
): ThemeSide | undefined {
  const { grounds, inks } = pass.graph
  const groundAt = grounds[theme]!
  const ground = restColor(pass, groundAt, theme)
  const ink = restColor(pass, looksAt.ink ? inks[theme]! : groundAt, theme)
  const reference = restColor(pass, looksAt.reference ?? groundAt, theme)
  return ground && ink && reference ? { ground, ink, reference } : undefined
}

const KEPT = { kind: 'keep' } as const

function ruleByTheme(
  pass: ValuePass,
  plan: Extract<ValuePlan, { kind: 'theme-rule' }>,
  place: ValuePlace,
): ResolvedCell | undefined {
  const { graph } = pass
  const parent = graph.parents[place.theme]!
  const before = cellAt(pass, place.token, parent, place.state)
  if (before === undefined) return undefined
  const rule = isKept(graph, plan, place) ? KEPT : plan.rule
  let span: ThemeSpan | undefined
  if (rule.kind !== 'keep' && rule.kind !== 'shift') {
    const against =
      rule.kind === 'match-contrast' ? matchReferences(graph, plan, place.theme) : undefined
    const ink = rule.kind !== 'relative'
    const own = sideOf(pass, place.theme, { ink, reference: against?.own })
    const from = sideOf(pass, parent, { ink, reference: against?.parent })
    if (!own || !from) return undefined
    span = { own, parent: from }
  }
  const { color, short } = applyThemeRule(before.color, rule, span)
  const theme = graph.model.themes[place.theme]!.id
  const told = { from: 'theme-rule', theme, rule, ...(short ? { short } : {}) } as const
  const provenance = pass.shared ? sharedByTheme(pass.shared, rule, told) : told
  return { color, provenance, aliasDepth: 0 }
}

function directionOf(
  pass: ValuePass,
  rest: ResolvedColor,
  place: ValuePlace,
): StepDirection | undefined {
  const { graph } = pass
  const row = place.token * graph.parents.length + place.theme
  const known = pass.directions.get(row)
  if (known || place.largest === undefined) return known
  const at = referenceAt(graph, place.largest.towards.reference, place.theme)
  const reference = restColor(pass, at, place.theme)
  const ink = restColor(pass, graph.inks[place.theme]!, place.theme)
  if (!reference || !ink) return undefined
  const direction = stepDirection(rest, { step: place.largest, reference, ink })
  pass.directions.set(row, direction)
  return direction
}

function ruleByState(
  pass: ValuePass,
  plan: Extract<ValuePlan, { kind: 'state-rule' }>,
  place: ValuePlace,
): ResolvedCell | undefined {
  const rest = restColor(pass, place.token, place.theme)
  if (rest === undefined) return undefined
  const direction = plan.rule.lightness === 0 ? undefined : directionOf(pass, rest, place)
  if (plan.rule.lightness !== 0 && direction === undefined) return undefined
  const { state, rule } = plan
  const { color, provenance: told } = applyStateRule(rest, { state, rule, direction })
  const provenance = pass.shared ? sharedByState(pass.shared, rule, told) : told
  return { color, provenance, aliasDepth: 0 }
}

/** Computes one value once everything that it is computed from is there; undefined where that is broken. */
export function computeValue(
  pass: ValuePass,
  plan: ValuePlan,
  place: ValuePlace,
): ResolvedCell | undefined {
  switch (plan.kind) {
    case 'set': {
      const isSource = place.theme === 0 && place.state === 'rest'
      const provenance: Provenance = { from: isSource ? 'source' : 'override' }
      return { color: toResolvedColor(plan.value.color), provenance, aliasDepth: 0 }
    }
    case 'follow':
      return follow(pass, plan, place.theme)
    case 'theme-rule':
      return ruleByTheme(pass, plan, place)
    case 'state-rule':
      return ruleByState(pass, plan, place)
  }
}
