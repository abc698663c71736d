import {
  type DerivedState,
  STATES,
  type SourceValue,
  type State,
  type SystemModel,
  type TokenModel,
} from './model.ts'
import { createRuleScopes, hasFields, type RuleScopes } from './rule-scopes.ts'

/** A model by position instead of id; -1 stands for what is missing. */
export interface ModelGraph {
  readonly model: SystemModel
  readonly rules: RuleScopes
  readonly tokenAt: ReadonlyMap<string, number>
  readonly themeAt: ReadonlyMap<string, number>
  /** By theme position; -1 for the base. */
  readonly parents: readonly number[]
  /** By theme position: token position of its ground and ink. */
  readonly grounds: readonly number[]
  readonly inks: readonly number[]
  /** The states that the token at a position lists, or has from its target. */
  statesAt(position: number): readonly DerivedState[]
}

/** The position of every theme's parent: the base has none, absent means the base. */
function parentsOf(model: SystemModel, themeAt: ReadonlyMap<string, number>): number[] {
  return model.themes.map((theme, position) => {
    if (position === 0) return -1
    return theme.from === undefined ? 0 : (themeAt.get(theme.from) ?? 0)
  })
}

type StatesAt = (position: number) => readonly DerivedState[] | undefined

/** An alias that lists no states has its target's; a chain is walked once for all on it. */
function createStatesAt(
  tokens: readonly TokenModel[],
  tokenAt: ReadonlyMap<string, number>,
  knownAt: StatesAt,
): ModelGraph['statesAt'] {
  const found: (readonly DerivedState[] | undefined)[] = new Array(tokens.length)
  return (position) => {
    const path: number[] = []
    let at: number | undefined = position
    let states: readonly DerivedState[] = []
    while (at !== undefined) {
      const token: TokenModel = tokens[at]!
      const known = found[at] ?? knownAt(at)
      const listed = known ?? (token.states.length > 0 ? token.states : undefined)
      if (listed !== undefined) {
        states = listed
        if (known === undefined) found[at] = listed
        break
      }
      path.push(at)
      found[at] = []
      at = token.value.kind === 'alias' ? tokenAt.get(token.value.token) : undefined
    }
    for (const passed of path) found[passed] = states
    return states
  }
}

/** What is known of a model's tokens before it is read. */
export interface KnownTokens {
  /** Present where the tokens are the same ones in the same order. */
  readonly tokenAt?: ReadonlyMap<string, number>
  readonly statesAt: StatesAt
}

/** Position of each item by id. */
export function positionsOf(
  items: readonly { readonly id: string }[],
): ReadonlyMap<string, number> {
  return new Map(items.map(({ id }, position) => [id, position]))
}

/** Reads a model into positions; the references it holds may be missing. */
export function createModelGraph(model: SystemModel, known?: KnownTokens): ModelGraph {
  const tokenAt = known?.tokenAt ?? positionsOf(model.tokens)
  const themeAt = positionsOf(model.themes)
  return {
    model,
    rules: createRuleScopes(model),
    tokenAt,
    themeAt,
    parents: parentsOf(model, themeAt),
    grounds: model.themes.map((theme) => tokenAt.get(theme.ground) ?? -1),
    inks: model.themes.map((theme) => tokenAt.get(theme.ink) ?? -1),
    statesAt: createStatesAt(model.tokens, tokenAt, known?.statesAt ?? (() => undefined)),
  }
}

/** A value and the position of the theme that sets it. */
export interface FoundValue {
  readonly theme: number
  readonly value: SourceValue
}

/**
 * The value set for a token's state in the nearest theme from the given one towards the base. A state's value
 * counts only where no nearer theme sets the token's rest.
 */
export function findValue(
  graph: ModelGraph,
  token: TokenModel,
  where: { readonly theme: number; readonly state: State },
): FoundValue | undefined {
  let theme = where.theme
  while (graph.parents[theme]! >= 0) {
    const set = token.values[graph.model.themes[theme]!.id]
    const value = set?.[where.state]
    if (value !== undefined) return { theme, value }
    if (set?.rest !== undefined) return undefined
    theme = graph.parents[theme]!
  }
  if (where.state === 'rest') return { theme, value: token.value }
  const value = token.values[graph.model.themes[theme]!.id]?.[where.state]
  return value === undefined ? undefined : { theme, value }
}

/** Whether an alias found in one theme still holds in another: no theme rule on the token itself lies between. */
export function isLive(
  graph: ModelGraph,
  token: TokenModel,
  span: { readonly from: number; readonly to: number },
): boolean {
  const own = token.rules?.themes
  if (own === undefined) return true
  for (let theme = span.to; theme !== span.from; theme = graph.parents[theme]!) {
    if (hasFields(own[graph.model.themes[theme]!.id])) return false
  }
  return true
}

/** Whether a theme leaves a token that is its ground or ink without a rest of its own; the base cannot. */
export function isRoleUnset(
  graph: ModelGraph,
  { token, theme }: { readonly token: number; readonly theme: number },
): boolean {
  if (theme === 0 || (graph.grounds[theme] !== token && graph.inks[theme] !== token)) return false
  const { id } = graph.model.themes[theme]!
  return graph.model.tokens[token]!.values[id]?.rest === undefined
}

/** Position of a state in STATES. */
export function stateAt(state: State): number {
  return STATES.indexOf(state)
}
