import type { ModelGraph } from './model-graph.ts'
import type { State, TokenModel } from './model.ts'
import { STATE_COUNT } from './resolved.ts'
import { ruleReferences } from './rule-scopes.ts'
import type { LargestStep } from './state-rule.ts'
import { nodeAt, referenceAt, type ValuePlan } from './value-plan.ts'

/** One node, and the step that decides the direction of its token's states. */
export interface ValuePlace {
  readonly node: number
  readonly token: number
  readonly theme: number
  readonly state: State
  readonly largest: LargestStep | undefined
}

/** The token whose contrast a `match-contrast` rule keeps, in the theme and in its parent. */
export function matchReferences(
  graph: ModelGraph,
  plan: Extract<ValuePlan, { kind: 'theme-rule' }>,
  theme: number,
): { readonly own: number; readonly parent: number } {
  const against = plan.rule.against ?? 'ground'
  return {
    own: referenceAt(graph, against, theme),
    parent: referenceAt(graph, against, graph.parents[theme]!),
  }
}

/** Whether a plan leaves its parent's value as it is, whatever the colours are. */
export function isKept(
  graph: ModelGraph,
  plan: Extract<ValuePlan, { kind: 'theme-rule' }>,
  place: { readonly token: number; readonly theme: number },
): boolean {
  if (plan.rule.kind === 'keep') return true
  if (plan.rule.kind !== 'match-contrast') return false
  return matchReferences(graph, plan, place.theme).own === place.token
}

function themeRuleTokens(
  graph: ModelGraph,
  plan: Extract<ValuePlan, { kind: 'theme-rule' }>,
  place: ValuePlace,
): { readonly own: readonly number[]; readonly parent: readonly number[] } {
  const { theme } = place
  const parent = graph.parents[theme]!
  if (plan.rule.kind === 'shift' || isKept(graph, plan, place)) return { own: [], parent: [] }
  const roles = {
    own: [graph.grounds[theme]!, graph.inks[theme]!],
    parent: [graph.grounds[parent]!, graph.inks[parent]!],
  }
  if (plan.rule.kind === 'mirror') return roles
  if (plan.rule.kind === 'relative') {
    return { own: roles.own.slice(0, 1), parent: roles.parent.slice(0, 1) }
  }
  const references = matchReferences(graph, plan, theme)
  return {
    own: [...roles.own, references.own],
    parent: [...roles.parent, references.parent],
  }
}

/** The nodes that a value is computed from; -1 for one whose token is missing. */
export function edgesOf(graph: ModelGraph, plan: ValuePlan, place: ValuePlace): readonly number[] {
  const { token, theme } = place
  const rest = (position: number, of = theme) =>
    position < 0 ? -1 : nodeAt(graph, position, of, 'rest')
  switch (plan.kind) {
    case 'set':
      return []
    case 'follow': {
      const target = graph.tokenAt.get(plan.target)
      return [target === undefined ? -1 : nodeAt(graph, target, theme, plan.state)]
    }
    case 'theme-rule': {
      const parent = graph.parents[theme]!
      const tokens = themeRuleTokens(graph, plan, place)
      return [
        place.node - (theme - parent) * STATE_COUNT,
        ...tokens.own.map((position) => rest(position)),
        ...tokens.parent.map((position) => rest(position, parent)),
      ]
    }
    case 'state-rule': {
      if (plan.rule.lightness === 0 || place.largest === undefined) return [rest(token)]
      const reference = referenceAt(graph, place.largest.towards.reference, theme)
      return [rest(token), rest(reference), rest(graph.inks[theme]!)]
    }
  }
}

/** Every other token that a token's values and rules name, in any theme; ground and ink are left out. */
export function namedTokens(graph: ModelGraph, token: TokenModel, position: number): string[] {
  const named = new Set(ruleReferences(token.rules))
  const follow = (value: TokenModel['value'] | undefined) => {
    if (value !== undefined && value.kind !== 'color') named.add(value.token)
  }
  follow(token.value)
  for (const theme of graph.model.themes) {
    for (const value of Object.values(token.values[theme.id] ?? {})) follow(value)
    const { against } = graph.rules.themeRuleOf(token, theme.id)
    if (typeof against === 'object') named.add(against.token)
  }
  for (const state of graph.statesAt(position)) {
    const { reference } = graph.rules.stateRuleOf(token, state).towards
    if (typeof reference === 'object') named.add(reference.token)
  }
  named.delete(token.id)
  return [...named]
}
