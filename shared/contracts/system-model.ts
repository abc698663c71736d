import type {
  PairModel,
  SystemModel,
  SystemSettings,
  ThemeModel,
  TokenModel,
} from '#shared/checks/model.ts'
import type { PairInput, PairWire } from './pairs.contract.ts'
import type { Fault } from './problems.ts'
import type { RulesWire } from './rules.contract.ts'
import type { SystemWire } from './systems.contract.ts'
import type { ThemeWire } from './themes.contract.ts'
import type { TokenWire } from './tokens.contract.ts'
import {
  pointerSegment,
  type Reading,
  readRuleScope,
  readStateRules,
  readStateValues,
  readThemeKey,
  readThemeRule,
  readTokenName,
  readValue,
  type WireNames,
} from './wire-values.ts'

/** What the API answers of a system, whole: enough to run the engine anywhere. */
export interface WholeSystem {
  readonly system: Pick<SystemWire, 'level' | 'p3' | 'p3Gates' | 'disabledFloor'>
  readonly tokens: readonly Omit<TokenWire, 'resolved' | 'etag'>[]
  readonly pairs: readonly Omit<PairWire, 'etag'>[]
  readonly themes: readonly Omit<ThemeWire, 'values' | 'etag'>[]
  readonly rules: Pick<RulesWire, 'states' | 'prefixes'>
}

/** The engine's settings from a system's answer. */
export function settingsFromWire(wire: WholeSystem['system']): SystemSettings {
  const { level, p3, p3Gates, disabledFloor } = wire
  return { level, p3, p3Gates, ...(disabledFloor === null ? {} : { disabledFloor }) }
}

/** The engine's token from the wire's; `id` and `name` as given. */
export function tokenFromWire(
  wire: Pick<TokenWire, 'id' | 'name' | 'value' | 'states' | 'values' | 'rules'>,
  reading: Reading,
): TokenModel {
  const values: Record<string, TokenModel['values'][string]> = {}
  for (const [key, byState] of Object.entries(wire.values)) {
    const at = `/values/${pointerSegment(key)}`
    values[readThemeKey(key, at, reading)] = readStateValues(byState, at, reading)
  }
  return {
    id: wire.id,
    name: wire.name,
    value: readValue(wire.value, '/value', reading),
    states: wire.states,
    values,
    ...(wire.rules ? { rules: readRuleScope(wire.rules, '/rules', reading) } : {}),
  }
}

/** The engine's pair from the wire's; `pointer` is where it stands in what is being read. */
export function pairFromWire(
  wire: PairInput & { readonly id: string },
  pointer: string,
  reading: Reading,
): PairModel {
  const { foreground, background, backdrop, themes, ...rest } = wire
  const { id, use, relation, states, level, minimum, anyOf, product, exempt } = rest
  return {
    id,
    foreground: readTokenName(foreground, `${pointer}/foreground`, reading),
    background: readTokenName(background, `${pointer}/background`, reading),
    use,
    relation,
    backdrop:
      backdrop === 'unknown'
        ? 'unknown'
        : (backdrop ?? []).map((name, at) =>
            readTokenName(name, `${pointer}/backdrop/${at}`, reading),
          ),
    ...(states === undefined ? {} : { states }),
    ...(themes === undefined
      ? {}
      : {
          themes: themes.map((key, at) => readThemeKey(key, `${pointer}/themes/${at}`, reading)),
        }),
    ...(level === undefined ? {} : { level }),
    ...(minimum === undefined ? {} : { minimum }),
    ...(anyOf === undefined ? {} : { anyOf }),
    ...(product === undefined ? {} : { product }),
    ...(exempt === undefined ? {} : { exempt }),
  }
}

/** The engine's theme from the wire's. */
export function themeFromWire(wire: WholeSystem['themes'][number], reading: Reading): ThemeModel {
  return {
    id: wire.id,
    key: wire.key,
    ...(wire.from === undefined ? {} : { from: readThemeKey(wire.from, '/from', reading) }),
    ground: readTokenName(wire.ground, '/ground', reading),
    ink: readTokenName(wire.ink, '/ink', reading),
    rule: readThemeRule(wire.rule, '/rule', reading),
    ...(wire.level === undefined ? {} : { level: wire.level }),
    gating: wire.gating,
  }
}

/** Looks names up among what the wire lists. */
export function namesOf(whole: Pick<WholeSystem, 'tokens' | 'themes'>): WireNames {
  const tokens = new Map(whole.tokens.map(({ name, id }) => [name, id]))
  const themes = new Map(whole.themes.map(({ key, id }) => [key, id]))
  return { tokenId: (name) => tokens.get(name), themeId: (key) => themes.get(key) }
}

/**
 * The engine's model of a system from the answers of the API.
 * @throws {TypeError} where the answers do not belong together (a name that none of them lists)
 */
export function modelFromWire(whole: WholeSystem): SystemModel {
  const faults: Fault[] = []
  const reading: Reading = { names: namesOf(whole), faults }
  const model: SystemModel = {
    settings: settingsFromWire(whole.system),
    states: readStateRules(whole.rules.states, '/states', reading),
    prefixes: whole.rules.prefixes.map(({ prefix, ...scope }, at) => ({
      prefix,
      ...readRuleScope(scope, `/prefixes/${at}`, reading),
    })),
    themes: whole.themes.map((theme) => themeFromWire(theme, reading)),
    tokens: whole.tokens.map((token) => tokenFromWire(token, reading)),
    pairs: whole.pairs.map((pair, at) => pairFromWire(pair, `/pairs/${at}`, reading)),
  }
  if (faults.length > 0) {
    throw new TypeError(`The answers do not belong together: ${faults[0]?.detail}`)
  }
  return model
}
