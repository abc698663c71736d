import type {
  Adjustment,
  DerivedState,
  Reference,
  SourceValue,
  State,
  TokenModel,
} from './model.ts'
import { type FoundValue, findValue, isLive, type ModelGraph, stateAt } from './model-graph.ts'
import { STATE_COUNT } from './resolved.ts'
import { hasFields, type MergedStateRule, type MergedThemeRule } from './rule-scopes.ts'

/** How one (token, theme, state) is computed; decided by the model alone, before any colour is known. */
export type ValuePlan =
  | { readonly kind: 'set'; readonly value: Extract<SourceValue, { kind: 'color' }> }
  | {
      readonly kind: 'follow'
      readonly target: string
      readonly state: State
      /** Present for a derived value, absent for an alias. */
      readonly adjustment?: Adjustment
    }
  | { readonly kind: 'theme-rule'; readonly rule: MergedThemeRule }
  | { readonly kind: 'state-rule'; readonly state: DerivedState; readonly rule: MergedStateRule }

/** Position of a (token, theme, state) node. */
export function nodeAt(graph: ModelGraph, token: number, theme: number, state: State): number {
  return (token * graph.parents.length + theme) * STATE_COUNT + stateAt(state)
}

/** The state in which a target is read: its own where it lists it, else rest. */
function stateOfTarget(graph: ModelGraph, target: string, state: State): State {
  const position = graph.tokenAt.get(target)
  const lists =
    position !== undefined && graph.statesAt(position).some((listed) => listed === state)
  return lists ? state : 'rest'
}

/** Rest as a live value of one kind in a theme. */
function liveRest(graph: ModelGraph, token: TokenModel, theme: number): SourceValue | undefined {
  const rest = findValue(graph, token, { theme, state: 'rest' })!
  return isLive(graph, token, { from: rest.theme, to: theme }) ? rest.value : undefined
}

/** A value set for a state follows the target's rest, unless rest follows the same target in the same way. */
function followPlan(
  graph: ModelGraph,
  token: TokenModel,
  node: { readonly theme: number; readonly state: State; readonly found: FoundValue },
): ValuePlan {
  const { value } = node.found
  if (value.kind === 'color') return { kind: 'set', value }
  const rest = node.state === 'rest' ? value : liveRest(graph, token, node.theme)
  const isSame = rest?.kind === value.kind && rest.token === value.token
  const state = isSame ? stateOfTarget(graph, value.token, node.state) : 'rest'
  if (value.kind === 'alias') return { kind: 'follow', target: value.token, state }
  const { lightness, chroma, hue, alpha } = value
  return {
    kind: 'follow',
    target: value.token,
    state,
    adjustment: { lightness, chroma, hue, alpha },
  }
}

/** Decides how a token's value in a theme and state is computed. */
export function planValue(
  graph: ModelGraph,
  token: TokenModel,
  where: { readonly theme: number; readonly state: State },
): ValuePlan {
  const { theme, state } = where
  const found = findValue(graph, token, where)
  if (found !== undefined) {
    const isOwn = found.theme === theme
    const isLiveReference =
      found.value.kind !== 'color' && isLive(graph, token, { from: found.theme, to: theme })
    if (isOwn || isLiveReference) return followPlan(graph, token, { theme, state, found })
    return {
      kind: 'theme-rule',
      rule: graph.rules.themeRuleOf(token, graph.model.themes[theme]!.id),
    }
  }
  const derivedState = state as DerivedState // Rest is always found.
  if (!hasFields(token.rules?.states?.[derivedState])) {
    const rest = liveRest(graph, token, theme)
    if (rest?.kind === 'alias' && stateOfTarget(graph, rest.token, state) === state) {
      return { kind: 'follow', target: rest.token, state }
    }
  }
  return {
    kind: 'state-rule',
    state: derivedState,
    rule: graph.rules.stateRuleOf(token, derivedState),
  }
}

/** The rest position of a token that a rule refers to, -1 where it is missing. */
export function referenceAt(graph: ModelGraph, reference: Reference, theme: number): number {
  if (reference === 'ground') return graph.grounds[theme]!
  if (reference === 'ink') return graph.inks[theme]!
  return graph.tokenAt.get(reference.token) ?? -1
}
