import type { DistinctSet, PairModel, SystemSettings } from '#shared/checks/model.ts'
import type { DistinctSetWire } from './distinct-sets.contract.ts'
import type { PairWire } from './pairs.contract.ts'
import type { GovernedSystem, GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import type { SystemWire } from './systems.contract.ts'
import type { ThemeWire } from './themes.contract.ts'
import type { TokenWire } from './tokens.contract.ts'
import {
  type ModelNames,
  writeRuleScope,
  writeStateValues,
  writeThemeRule,
  writeValue,
} from './wire-values.ts'

/** What a token is set to, without what it comes to. */
export type TokenSource = Omit<TokenWire, 'resolved' | 'etag'>

/** A token as an answer gives it, other tokens and themes by name. */
export function presentToken(token: GovernedToken, names: ModelNames): TokenSource {
  const { description, deprecated, rules } = token
  const values = Object.entries(token.values).map(([themeId, byState]) => [
    names.themeKey(themeId),
    writeStateValues(byState, names),
  ])
  return {
    id: token.id,
    name: token.name,
    ...(description === undefined ? {} : { description }),
    value: writeValue(token.value, names),
    states: [...token.states],
    values: Object.fromEntries(values),
    ...(rules === undefined ? {} : { rules: writeRuleScope(rules, names) }),
    locked: token.locked,
    ...(deprecated === undefined ? {} : { deprecated: presentDeprecation(deprecated, names) }),
  }
}

function presentDeprecation(
  { reason, replacement, sunset }: NonNullable<GovernedToken['deprecated']>,
  names: ModelNames,
): NonNullable<TokenWire['deprecated']> {
  return {
    ...(reason === undefined ? {} : { reason }),
    ...(replacement === undefined ? {} : { replacement: names.tokenName(replacement) }),
    ...(sunset === undefined ? {} : { sunset }),
  }
}

/** A declared pair as an answer gives it; a backdrop that is only the ground is left out. */
export function presentPair(pair: PairModel, names: ModelNames): Omit<PairWire, 'etag'> {
  const { foreground, background, backdrop, themes, states, exempt, ...rest } = pair
  return {
    ...rest,
    foreground: names.tokenName(foreground),
    background: names.tokenName(background),
    ...(backdrop === 'unknown' ? { backdrop } : {}),
    ...(backdrop !== 'unknown' && backdrop.length > 0
      ? { backdrop: backdrop.map((id) => names.tokenName(id)) }
      : {}),
    ...(states === undefined ? {} : { states: [...states] }),
    ...(themes === undefined ? {} : { themes: themes.map((id) => names.themeKey(id)) }),
    ...(exempt === undefined ? {} : { exempt }),
  }
}

/** A theme as an answer gives it, without the values that stand on its tokens. */
export function presentTheme(
  theme: GovernedTheme,
  { model, names }: { readonly model: GovernedSystem; readonly names: ModelNames },
): Omit<ThemeWire, 'values' | 'etag'> {
  const position = model.themes.findIndex(({ id }) => id === theme.id)
  const parent = theme.from ?? model.themes[0]?.id
  return {
    id: theme.id,
    key: theme.key,
    name: theme.name,
    position,
    ...(position > 0 && parent !== undefined ? { from: names.themeKey(parent) } : {}),
    ground: names.tokenName(theme.ground),
    ink: names.tokenName(theme.ink),
    rule: writeThemeRule(theme.rule, names),
    ...(theme.level === undefined ? {} : { level: theme.level }),
    gating: theme.gating,
  }
}

/** What a theme sets itself, by token name and state. */
export function presentThemeValues(
  theme: GovernedTheme,
  { model, names }: { readonly model: GovernedSystem; readonly names: ModelNames },
): ThemeWire['values'] {
  return Object.fromEntries(
    model.tokens.flatMap((token) => {
      const byState = token.values[theme.id]
      return byState === undefined ? [] : [[token.name, writeStateValues(byState, names)]]
    }),
  )
}

/** The settings that revisions govern, as an answer gives them. */
export function presentSettings(
  settings: SystemSettings,
): Pick<SystemWire, 'level' | 'p3' | 'p3Gates' | 'disabledFloor'> {
  const { level, p3, p3Gates, disabledFloor } = settings
  return { level, p3, p3Gates, disabledFloor: disabledFloor ?? null }
}

/** A distinct set as an answer gives it. */
export const presentDistinctSet = (
  { id, name, tokens }: DistinctSet,
  names: ModelNames,
): Omit<DistinctSetWire, 'etag'> => ({
  id,
  name,
  tokens: tokens.map((token) => names.tokenName(token)),
})
