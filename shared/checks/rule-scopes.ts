import type {
  Adjustment,
  DerivedState,
  PrefixRules,
  Reference,
  RuleScope,
  StateRule,
  SystemModel,
  ThemeRule,
  TokenModel,
} from './model.ts'

/** A state rule with every field decided. */
export type MergedStateRule = Required<StateRule>

/** A theme rule with its kind decided; further fields keep their defaults open. */
export type MergedThemeRule = ThemeRule & { readonly kind: NonNullable<ThemeRule['kind']> }

const UNCHANGED: Required<Adjustment> = { lightness: 0, chroma: 1, hue: 0, alpha: 1 }
const AWAY_FROM_GROUND: MergedStateRule['towards'] = { direction: 'away', reference: 'ground' }
const KEEP: MergedThemeRule = { kind: 'keep' }

/** What a state does where no rule says otherwise; rules are merged over it field by field. */
const DEFAULT_STATE_RULES: Readonly<Record<DerivedState, MergedStateRule>> = {
  hover: { ...UNCHANGED, lightness: 0.05, towards: AWAY_FROM_GROUND },
  active: { ...UNCHANGED, lightness: 0.1, towards: AWAY_FROM_GROUND },
  focus: { ...UNCHANGED, towards: AWAY_FROM_GROUND },
  disabled: { ...UNCHANGED, chroma: 0.35, alpha: 0.45, towards: AWAY_FROM_GROUND },
}

/** Whether a rule says anything: a rule without fields is none. */
export function hasFields(rule: StateRule | ThemeRule | undefined): boolean {
  return rule !== undefined && Object.values(rule).some((field) => field !== undefined)
}

/** Lays the fields that are given over those below. */
function over<Rule extends object>(below: Rule, above: Partial<Rule> | undefined): Rule {
  if (above === undefined) return below
  const merged: Rule = { ...below }
  for (const [field, value] of Object.entries(above)) {
    if (value !== undefined) Object.assign(merged, { [field]: value })
  }
  return merged
}

/** The rules that hold for a token: system, then name prefixes from short to long, then the token's own. */
export interface RuleScopes {
  stateRuleOf(token: TokenModel, state: DerivedState): MergedStateRule
  /** `theme` is any but the base, which has no rule. */
  themeRuleOf(token: TokenModel, theme: string): MergedThemeRule
}

/** What all tokens under the same prefixes have in common, merged once. */
interface SharedRules {
  readonly states: Map<DerivedState, MergedStateRule>
  readonly themes: Map<string, MergedThemeRule>
  readonly scopes: readonly RuleScope[]
}

/** Finds the shared rules of a name; the longest prefix that covers it stands for all that do. */
function createSharedRules(prefixes: readonly PrefixRules[]): (name: string) => SharedRules {
  const scopesOfPrefix = new Map<string, PrefixRules[]>()
  for (const rules of prefixes) {
    scopesOfPrefix.set(rules.prefix, [...(scopesOfPrefix.get(rules.prefix) ?? []), rules])
  }
  const sharedOfPrefix = new Map<string, SharedRules>()
  const sharedOfName = new Map<string, SharedRules>()
  return (name) => {
    const known = sharedOfName.get(name)
    if (known) return known
    const covering = segmentPrefixes(name).filter((prefix) => scopesOfPrefix.has(prefix))
    const longest = covering.at(-1) ?? ''
    let shared = sharedOfPrefix.get(longest)
    if (shared === undefined) {
      const scopes = covering.flatMap((prefix) => scopesOfPrefix.get(prefix)!)
      shared = { states: new Map(), themes: new Map(), scopes }
      sharedOfPrefix.set(longest, shared)
    }
    sharedOfName.set(name, shared)
    return shared
  }
}

/** `a`, `a.b` and `a.b.c` for `a.b.c`. */
function segmentPrefixes(name: string): string[] {
  const prefixes: string[] = []
  for (let end = name.indexOf('.'); end >= 0; end = name.indexOf('.', end + 1)) {
    prefixes.push(name.slice(0, end))
  }
  return [...prefixes, name]
}

/** Reads the rules of a model; what tokens have in common is merged once. */
export function createRuleScopes(model: SystemModel): RuleScopes {
  const sharedOf = createSharedRules(model.prefixes)
  const systemThemeRules = new Map(model.themes.map((theme) => [theme.id, theme.rule]))
  return {
    stateRuleOf(token, state) {
      const shared = sharedOf(token.name)
      let rule = shared.states.get(state)
      if (rule === undefined) {
        rule = over(DEFAULT_STATE_RULES[state], model.states[state])
        for (const scope of shared.scopes) rule = over(rule, scope.states?.[state])
        shared.states.set(state, rule)
      }
      return over(rule, token.rules?.states?.[state])
    },
    themeRuleOf(token, theme) {
      const shared = sharedOf(token.name)
      let rule = shared.themes.get(theme)
      if (rule === undefined) {
        rule = over(KEEP, systemThemeRules.get(theme))
        for (const scope of shared.scopes) rule = over(rule, scope.themes?.[theme])
        shared.themes.set(theme, rule)
      }
      return over(rule, token.rules?.themes?.[theme])
    },
  }
}

/** Whether a prefix covers a name: by whole segments, so `action` covers `action.fill` and not `actions`. */
export function coversName(prefix: string, name: string): boolean {
  return name === prefix || name.startsWith(`${prefix}.`)
}

function tokenIn(reference: Reference | undefined): string | undefined {
  return typeof reference === 'object' ? reference.token : undefined
}

/** Every token that the rules of one scope name. */
export function ruleReferences(scope: RuleScope | undefined): string[] {
  const states = Object.values(scope?.states ?? {}).map((rule) => tokenIn(rule?.towards?.reference))
  const themes = Object.values(scope?.themes ?? {}).map((rule) => tokenIn(rule.against))
  return [...states, ...themes].filter((id) => id !== undefined)
}
