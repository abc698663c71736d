import type {
  PairModel,
  SourceValue,
  SystemModel,
  SystemSettings,
  ThemeModel,
  TokenModel,
} from '#shared/checks/model.ts'
import { parseColor } from '#shared/color/parse-color.ts'

/** A source value from CSS text, or an alias from `{id}`. */
export function value(text: string): SourceValue {
  const alias = /^\{(.*)\}$/.exec(text)
  if (alias) return { kind: 'alias', token: alias[1]! }
  const parsed = parseColor(text)
  if (!parsed.ok) throw new TypeError(parsed.reason)
  return { kind: 'color', color: parsed.color }
}

/** A token whose id and name are the same, so that tests read like the rules. */
export function token(id: string, text: string, more: Partial<TokenModel> = {}): TokenModel {
  return { id, name: id, value: value(text), states: [], values: {}, ...more }
}

export function pair(
  foreground: string,
  background: string,
  more: Partial<PairModel> = {},
): PairModel {
  return {
    id: `${foreground} on ${background}`,
    foreground,
    background,
    use: 'text',
    relation: 'inside',
    backdrop: [],
    ...more,
  }
}

export const GROUND = 'oklch(0.97 0.01 80)'
export const INK = 'oklch(0.25 0.02 250)'
export const DARK_GROUND = 'oklch(0.22 0.03 250)'
export const DARK_INK = 'oklch(0.94 0.01 80)'

export const SETTINGS: SystemSettings = { level: 'AA', p3: false, p3Gates: true }

/** A light and a dark theme on tokens `ground` and `ink`; tokens, pairs and the rest as given. */
export function system(
  parts: {
    readonly tokens?: readonly TokenModel[]
    readonly pairs?: readonly PairModel[]
    readonly light?: Partial<ThemeModel>
    readonly dark?: Partial<ThemeModel>
    readonly themes?: readonly ThemeModel[]
    readonly settings?: Partial<SystemSettings>
  } & Partial<Pick<SystemModel, 'states' | 'prefixes'>> = {},
): SystemModel {
  return {
    settings: { ...SETTINGS, ...parts.settings },
    states: parts.states ?? {},
    prefixes: parts.prefixes ?? [],
    themes: parts.themes ?? [theme('light', parts.light), theme('dark', parts.dark)],
    tokens: [
      token('ground', GROUND, {
        values: { dark: { rest: value(DARK_GROUND) }, kiosk: { rest: value('#ffffff') } },
      }),
      token('ink', INK, {
        values: { dark: { rest: value(DARK_INK) }, kiosk: { rest: value('#000000') } },
      }),
      ...(parts.tokens ?? []),
    ],
    pairs: parts.pairs ?? [],
  }
}

export function theme(key: string, more: Partial<ThemeModel> = {}): ThemeModel {
  return { id: key, key, ground: 'ground', ink: 'ink', gating: true, ...more }
}
