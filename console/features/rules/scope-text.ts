import { DERIVED_STATES, type DerivedState } from '#shared/checks/model.ts'
import type { RuleScopeWire } from '#shared/contracts/rules.contract.ts'
import { readStateRuleText, type StateRuleText, stateRuleText } from './state-rule-text.ts'
import { readThemeRuleText, type ThemeRuleText, themeRuleText } from './theme-rule-text.ts'

/** The rules of a scope as they stand in fields. */
export interface ScopeText {
  readonly states: { readonly [state in DerivedState]: StateRuleText }
  /** By theme key, the base left out. */
  readonly themes: { readonly [key: string]: ThemeRuleText }
}

export function scopeFields(rules: RuleScopeWire, themes: readonly string[]): ScopeText {
  const text = (state: DerivedState) => stateRuleText(rules.states?.[state] ?? {})
  return {
    states: {
      hover: text('hover'),
      active: text('active'),
      focus: text('focus'),
      disabled: text('disabled'),
    },
    themes: Object.fromEntries(
      themes.map((key) => [key, themeRuleText(rules.themes?.[key] ?? {})]),
    ),
  }
}

/** The rules that fields say; none where one of them cannot be read. */
export function readScopeFields(text: ScopeText): RuleScopeWire | undefined {
  const states: NonNullable<RuleScopeWire['states']> = {}
  const themes: NonNullable<RuleScopeWire['themes']> = {}
  for (const state of DERIVED_STATES) {
    const read = readStateRuleText(text.states[state])
    if (!read.ok) return undefined
    if (Object.keys(read.rule).length > 0) states[state] = read.rule
  }
  for (const [key, fields] of Object.entries(text.themes)) {
    const read = readThemeRuleText(fields)
    if (!read.ok) return undefined
    if (Object.keys(read.rule).length > 0) themes[key] = read.rule
  }
  return {
    ...(Object.keys(states).length > 0 ? { states } : {}),
    ...(Object.keys(themes).length > 0 ? { themes } : {}),
  }
}

/** Whether two scopes say the same, whatever the order of what they say. */
export function isSameRules(first: RuleScopeWire, second: RuleScopeWire): boolean {
  return canonical(first) === canonical(second)
}

function canonical({ states = {}, themes = {} }: RuleScopeWire): string {
  const sorted = (rules: object) =>
    Object.entries(rules)
      .filter(([, rule]) => rule !== undefined && Object.keys(rule).length > 0)
      .map(([name, rule]) => [name, Object.entries(rule as object).sort()])
      .sort()
  return JSON.stringify([sorted(states), sorted(themes)])
}
