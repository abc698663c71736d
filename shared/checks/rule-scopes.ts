import type {
  Adjustment,
  DerivedState,
  PrefixRules,
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

/** Reads the rules of a model; what tokens have in common is merged once. */
export function createRuleScopes(model: SystemModel): RuleScopes {
  const prefixScopes = new Map<string, PrefixRules[]>()
  for (const rules of model.prefixes) {
    const same = prefixScopes.get(rules.prefix)
    if (same) same.push(rules)
    else prefixScopes.set(rules.prefix, [rules])
  }
  const systemThemeRules = new Map(model.themes.map((theme) => [theme.id, theme.rule]))
  const stateRules = new Map<string, MergedStateRule>()
  const themeRules = new Map<string, MergedThemeRule>()
  const scopesOf = new Map<string, { key: string; scopes: readonly RuleScope[] }>()

  /** The prefixes that cover a name, and the longest of them, which stands for all. */
  const covering = (name: string) => {
    const known = scopesOf.get(name)
    if (known) return known
    const scopes: RuleScope[] = []
    let key = ''
    if (prefixScopes.size > 0) {
      for (let end = name.indexOf('.'); ; end = name.indexOf('.', end + 1)) {
        const prefix = end < 0 ? name : name.slice(0, end)
        const found = prefixScopes.get(prefix)
        if (found) {
          scopes.push(...found)
          key = prefix
        }
        if (end < 0) break
      }
    }
    const result = { key, scopes }
    scopesOf.set(name, result)
    return result
  }

  return {
    stateRuleOf(token, state) {
      const { key, scopes } = covering(token.name)
      const sharedKey = `${state} ${key}`
      let shared = stateRules.get(sharedKey)
      if (shared === undefined) {
        shared = over(DEFAULT_STATE_RULES[state], model.states[state])
        for (const scope of scopes) shared = over(shared, scope.states?.[state])
        stateRules.set(sharedKey, shared)
      }
      return over(shared, token.rules?.states?.[state])
    },
    themeRuleOf(token, theme) {
      const { key, scopes } = covering(token.name)
      const sharedKey = `${theme} ${key}`
      let shared = themeRules.get(sharedKey)
      if (shared === undefined) {
        shared = over(KEEP, systemThemeRules.get(theme))
        for (const scope of scopes) shared = over(shared, scope.themes?.[theme])
        themeRules.set(sharedKey, shared)
      }
      return over(shared, token.rules?.themes?.[theme])
    },
  }
}

/** Whether a prefix covers a name: by whole segments, so `action` covers `action.fill` and not `actions`. */
export function coversName(prefix: string, name: string): boolean {
  return name === prefix || name.startsWith(`${prefix}.`)
}
