import type { SystemEdits } from '#shared/checks/edits.ts'
import {
  type Adjustment,
  DERIVED_STATES,
  EXEMPTIONS,
  type PairModel,
  type PrefixRules,
  type Reference,
  type SourceValue,
  STATES,
  type StateRule,
  type StateRules,
  type SystemModel,
  type SystemSettings,
  THEME_RULE_KINDS,
  type ThemeModel,
  type ThemeRule,
  type TokenModel,
  USES,
} from '#shared/checks/model.ts'
import { DARK_GROUND, DARK_INK, GROUND, INK, token, value } from './model-builder.ts'

/** A deterministic stream of choices: the same seed makes the same system. */
export class Dice {
  #state: number
  constructor(seed: number) {
    this.#state = seed >>> 0 || 1
  }
  /** mulberry32. */
  next(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0
    let t = this.#state
    t = Math.imul(t ^ (t >>> 15), t | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32
  }
  chance(probability: number): boolean {
    return this.next() < probability
  }
  upTo(count: number): number {
    return Math.floor(this.next() * count)
  }
  pick<Item>(items: readonly Item[]): Item {
    return items[this.upTo(items.length)]!
  }
  some<Item>(items: readonly Item[], probability: number): Item[] {
    return items.filter(() => this.chance(probability))
  }
  /** A member, or none at all. */
  maybe<Value extends object>(probability: number, make: () => Value): Value | object {
    return this.chance(probability) ? make() : {}
  }
}

const THEMES = ['light', 'dark', 'kiosk']
const GROUPS = ['a', 'a.b', 'a.bc', 'd']

function decimal(dice: Dice, most: number): number {
  return Math.round(dice.next() * most * 1000) / 1000
}

function color(dice: Dice): SourceValue {
  const l = dice.chance(0.1) ? dice.pick([0, 1, 0.97, 0.22]) : decimal(dice, 1)
  return {
    kind: 'color',
    color: {
      l: dice.chance(0.02) ? null : l,
      c: dice.chance(0.2) ? dice.pick([0, null]) : decimal(dice, 0.3),
      h: dice.chance(0.1) ? null : decimal(dice, 359),
      alpha: dice.chance(0.2) ? dice.pick([0, 0.3, 0.5, 0.9, null]) : 1,
    },
  }
}

function adjustment(dice: Dice): Adjustment {
  return {
    ...dice.maybe(0.5, () => ({ lightness: dice.pick([-0.3, -0.1, 0.1, 0.4]) })),
    ...dice.maybe(0.4, () => ({ chroma: dice.pick([0, 0.5, 1.4]) })),
    ...dice.maybe(0.4, () => ({ hue: dice.pick([-40, 25, 200]) })),
    ...dice.maybe(0.2, () => ({ alpha: dice.pick([0.5, 0.8]) })),
  }
}

/** References mostly go back to earlier tokens, so that most models have no cycle; some do. */
function setValue(dice: Dice, ids: readonly string[], at: number): SourceValue {
  if (dice.chance(0.55)) return color(dice)
  const target = dice.chance(0.97) ? ids[dice.upTo(Math.max(1, at))]! : dice.pick(ids)
  if (dice.chance(0.75)) return { kind: 'alias', token: target }
  return { kind: 'derived', token: target, ...adjustment(dice) }
}

function reference(dice: Dice, ids: readonly string[]): Reference {
  return dice.chance(0.5) ? dice.pick(['ground', 'ink'] as const) : { token: dice.pick(ids) }
}

function stateRule(dice: Dice, ids: readonly string[]): StateRule {
  return {
    ...dice.maybe(0.6, () => ({ lightness: dice.pick([0, 0.03, 0.1, 0.3, 0.7]) })),
    ...dice.maybe(0.3, () => ({ chroma: dice.pick([0.5, 1, 1.5]) })),
    ...dice.maybe(0.2, () => ({ hue: dice.pick([-30, 100]) })),
    ...dice.maybe(0.2, () => ({ alpha: dice.pick([0.4, 1]) })),
    ...dice.maybe(0.5, () => ({
      towards: {
        direction: dice.pick(['away', 'towards'] as const),
        reference: reference(dice, ids),
      },
    })),
  }
}

function stateRules(dice: Dice, ids: readonly string[], probability: number): StateRules {
  return Object.fromEntries(
    dice.some(DERIVED_STATES, probability).map((state) => [state, stateRule(dice, ids)]),
  )
}

/** `against` names early tokens only, again to keep cycles rare. */
function themeRule(dice: Dice, ids: readonly string[]): ThemeRule {
  return {
    ...dice.maybe(0.85, () => ({ kind: dice.pick(THEME_RULE_KINDS) })),
    ...dice.maybe(0.4, () => ({ chroma: dice.pick([0.8, 1.2]) })),
    ...dice.maybe(0.3, () => ({ k: dice.pick([0.5, 0, 2]) })),
    ...dice.maybe(0.3, () => ({ lightness: dice.pick([-0.2, 0.1]) })),
    ...dice.maybe(0.3, () => ({ hue: dice.pick([15, -90]) })),
    ...dice.maybe(0.4, () => ({ against: reference(dice, ids.slice(0, 4)) })),
  }
}

function ruleScope(dice: Dice, ids: readonly string[], probability: number) {
  return {
    states: stateRules(dice, ids, probability),
    themes: Object.fromEntries(
      dice.some(['dark', 'kiosk'], probability).map((theme) => [theme, themeRule(dice, ids)]),
    ),
  }
}

export function randomToken(dice: Dice, ids: readonly string[], at: number): TokenModel {
  const id = ids[at]!
  const values: Record<string, Record<string, SourceValue>> = {}
  for (const theme of dice.some(THEMES, 0.3)) {
    const states = dice.some(theme === 'light' ? DERIVED_STATES : STATES, 0.35)
    values[theme] = Object.fromEntries(states.map((state) => [state, setValue(dice, ids, at)]))
  }
  return {
    id,
    name: `${dice.pick(GROUPS)}.${id}`,
    value: setValue(dice, ids, at),
    states: dice.chance(0.35) ? [] : dice.some(DERIVED_STATES, 0.5),
    values,
    ...dice.maybe(0.2, () => ({ rules: ruleScope(dice, ids, 0.4) })),
  }
}

export function randomPair(dice: Dice, ids: readonly string[], id: string): PairModel {
  return {
    id,
    foreground: dice.pick(ids),
    background: dice.pick(ids),
    use: dice.pick(USES),
    relation: dice.pick(['inside', 'together']),
    backdrop: dice.chance(0.03)
      ? 'unknown'
      : dice.chance(0.3)
        ? [dice.pick(ids), ...dice.some([dice.pick(ids)], 0.4)]
        : [],
    ...dice.maybe(0.25, () => ({ states: dice.some(STATES, 0.5) })),
    ...dice.maybe(0.25, () => ({ themes: dice.some(THEMES, 0.6) })),
    ...dice.maybe(0.2, () => ({ level: 'AAA' as const })),
    ...dice.maybe(0.1, () => ({ minimum: dice.pick([7, 9.5]) })),
    ...dice.maybe(0.2, () => ({ anyOf: dice.pick(['ring', 'bar']) })),
    ...dice.maybe(0.12, () => ({ exempt: { kind: dice.pick(EXEMPTIONS), reason: 'drawn' } })),
  }
}

function randomThemes(dice: Dice, ids: readonly string[]): ThemeModel[] {
  const roles = { ground: 'ground', ink: 'ink' }
  const from = dice.chance(0.5) ? { from: 'dark' } : {}
  const level = dice.maybe(0.5, () => ({ level: 'AAA' as const }))
  return [
    { id: 'light', key: 'light', ...roles, gating: true },
    { id: 'dark', key: 'dark', ...roles, rule: themeRule(dice, ids), gating: dice.chance(0.8) },
    {
      id: 'kiosk',
      key: 'kiosk',
      ...roles,
      ...from,
      rule: themeRule(dice, ids),
      ...level,
      gating: true,
    },
  ]
}

function randomSettings(dice: Dice): SystemSettings {
  return {
    level: dice.pick(['AA', 'AA', 'AAA'] as const),
    p3: dice.chance(0.6),
    p3Gates: dice.chance(0.7),
    ...dice.maybe(0.4, () => ({ disabledFloor: dice.pick([1.5, 2.2]) })),
  }
}

function randomPrefixes(dice: Dice, ids: readonly string[]): PrefixRules[] {
  return dice.some(GROUPS, 0.4).map((prefix) => ({ prefix, ...ruleScope(dice, ids, 0.4) }))
}

/** Pairs and themes of a strict system may not ask for less, so what would be refused is dropped. */
function strict(settings: SystemSettings, pairs: readonly PairModel[]): PairModel[] {
  return pairs.map((pair) => {
    if (pair.minimum === undefined) return pair
    const { minimum: _, ...rest } = pair
    return settings.level === 'AAA' || pair.level === 'AAA' ? rest : pair
  })
}

export function randomSystem(dice: Dice, size = 11): SystemModel {
  const ids = ['ground', 'ink', ...Array.from({ length: size }, (_, at) => `t${at}`)]
  const settings = randomSettings(dice)
  const pairs = Array.from({ length: size }, (_, at) => randomPair(dice, ids, `p${at}`))
  return {
    settings,
    states: stateRules(dice, ids, 0.3),
    prefixes: randomPrefixes(dice, ids),
    themes: randomThemes(dice, ids.slice(0, 5)),
    tokens: [
      token('ground', GROUND, {
        name: 'a.ground',
        states: dice.some(DERIVED_STATES, 0.3),
        values: { dark: { rest: value(DARK_GROUND) }, kiosk: { rest: value('#ffffff') } },
      }),
      token('ink', INK, {
        name: 'd.ink',
        states: dice.some(DERIVED_STATES, 0.3),
        values: { dark: { rest: value(DARK_INK) }, kiosk: { rest: value('#0a0a0a') } },
      }),
      ...ids.slice(2).map((_, at) => randomToken(dice, ids, at + 2)),
    ],
    pairs: strict(settings, pairs),
  }
}

/** One edit of the kinds that people make, deletions and faults among them. */
export function randomEdits(dice: Dice, model: SystemModel): SystemEdits {
  const ids = model.tokens.map(({ id }) => id)
  const kinds = ['tokens', 'tokens', 'tokens', 'value', 'value', 'value', 'pairs', 'pairs']
  const rare = ['prefixes', 'states', 'themes', 'settings', 'remove', 'add', 'both']
  const kind = dice.chance(0.7) ? dice.pick(kinds) : dice.pick(rare)
  const editToken = () => {
    const at = 2 + dice.upTo(ids.length - 2)
    return randomToken(dice, ids, at)
  }
  const editPairs = () => ({
    put: [randomPair(dice, ids, dice.chance(0.7) ? `p${dice.upTo(12)}` : `q${dice.upTo(9)}`)],
    ...dice.maybe(0.3, () => ({ remove: [`p${dice.upTo(12)}`] })),
  })
  switch (kind) {
    case 'value': {
      const before = model.tokens[dice.upTo(ids.length)]!
      return { tokens: { put: [{ ...before, value: color(dice) }] } }
    }
    case 'pairs':
      return { pairs: editPairs() }
    case 'prefixes':
      return { prefixes: randomPrefixes(dice, ids) }
    case 'states':
      return { states: stateRules(dice, ids, 0.4) }
    case 'themes':
      return { themes: randomThemes(dice, ids.slice(0, 5)) }
    case 'settings':
      return { settings: randomSettings(dice) }
    case 'remove':
      return { tokens: { remove: [dice.pick(ids)] } }
    case 'add': {
      const id = `n${dice.upTo(5)}`
      return { tokens: { put: [randomToken(dice, [...ids, id], ids.length)] } }
    }
    case 'both': {
      const gone = dice.pick(ids.slice(2))
      const left = model.pairs.filter((one) => JSON.stringify(one).includes(`"${gone}"`))
      return {
        tokens: { put: [editToken()], remove: [gone] },
        pairs: { ...editPairs(), remove: left.map(({ id }) => id) },
      }
    }
    default:
      return { tokens: { put: [editToken(), ...dice.some([editToken()], 0.4)] } }
  }
}
