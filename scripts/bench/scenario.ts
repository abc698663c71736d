import type { PairModel, SystemModel, TokenModel } from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'

/** The themes and states of every system here: 3 × 5. */
const STATES = ['hover', 'active', 'focus', 'disabled'] as const
const USES = ['text', 'large-text', 'non-text', 'text'] as const
const GROUND = 'tok_ground'
const INK = 'tok_ink'
/** The token that is tried. */
export const FOCUS = 'tok_focus'
const FOCUS_PAIRS = 4

export interface Size {
  readonly tokens: number
  readonly pairs: number
}

/**
 * A system of a size, the same one at every call: three themes, tokens with all states, three in ten aliases,
 * one in ten translucent, one in twenty overridden in a theme, three in ten pairs `inside`. Its last token is plain
 * and has exactly 60 findings, whatever the size.
 */
export function systemOf({ tokens: count, pairs: pairCount }: Size): SystemModel {
  const random = seeded(7)
  const tokens = [...roles(), ...Array.from({ length: count - 3 }, (_, at) => plain(at, random))]
  const under = tokens.filter((_, at) => at % 2 === 0)
  const over = tokens.filter((_, at) => at % 2 === 1)
  const focus = { ...plain(1, random), id: 'tok_focus', name: 'focus' }
  const pairs = Array.from({ length: pairCount - FOCUS_PAIRS }, (_, at) =>
    pairOf({ at, random, foreground: pick(over, random), background: pick(under, random) }),
  )
  const own = Array.from({ length: FOCUS_PAIRS }, (_, at) =>
    ownPair({ at: pairCount + at, random, foreground: focus, background: under[at]! }),
  )
  return {
    settings: { level: 'AA', p3: true, p3Gates: false },
    states: {},
    prefixes: [{ prefix: 'group3', themes: { thm_dark: { kind: 'match-contrast' } } }],
    themes: [
      { id: 'thm_light', key: 'light', ground: GROUND, ink: INK, gating: true },
      theme('dark', { kind: 'mirror', chroma: 0.92 }),
      { ...theme('kiosk', { kind: 'relative' }), level: 'AAA' },
    ],
    tokens: [...tokens, focus],
    pairs: [...pairs, ...own],
  }
}

/** Mulberry32: the same numbers in every run. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = Math.imul(state ^ (state >>> 15), state | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32
  }
}

function roles(): TokenModel[] {
  const ground = colored(GROUND, 'ground', [0.98, 0.01, 80])
  const ink = colored(INK, 'ink', [0.2, 0.02, 250])
  return [
    { ...ground, values: inDark([0.2, 0.03, 250], [1, 0, 0]) },
    { ...ink, values: inDark([0.95, 0.01, 80], [0, 0, 0]) },
  ]
}

function inDark(dark: Triple, kiosk: Triple): TokenModel['values'] {
  return {
    thm_dark: { rest: { kind: 'color', color: oklch(dark) } },
    thm_kiosk: { rest: { kind: 'color', color: oklch(kiosk) } },
  }
}

/** Even ones are made to lie under others, odd ones to lie on them: most pairs of a governed system pass. */
function plain(at: number, random: () => number): TokenModel {
  const [id, name] = [`tok_${at}`, `group${at % 40}.token${at}`]
  if (at > 100 && random() < 0.3) {
    const target = `tok_${Math.floor(random() * 25) * 2 + (at % 2)}`
    return { id, name, value: { kind: 'alias', token: target }, states: STATES, values: {} }
  }
  const isUnder = at % 2 === 0
  const l = isUnder ? 0.92 + random() * 0.08 : 0.15 + random() * 0.3
  const c = random() * (isUnder ? 0.05 : 0.18)
  const alpha = random() < 0.1 ? 0.9 : 1
  const value = { kind: 'color', color: { l, c, h: random() * 360, alpha } } as const
  const values: TokenModel['values'] = random() < 0.05 ? { thm_kiosk: { rest: value } } : {}
  return { id, name, value, states: STATES, values }
}

type Triple = readonly [number, number, number]

function oklch([l, c, h]: Triple): Oklch {
  return { l, c, h, alpha: 1 }
}

function colored(id: string, name: string, triple: Triple) {
  const color = oklch(triple)
  return { id, name, value: { kind: 'color', color } as const, color, states: STATES, values: {} }
}

function theme(key: string, rule: NonNullable<SystemModel['themes'][number]['rule']>) {
  return { id: `thm_${key}`, key, from: 'thm_light', ground: GROUND, ink: INK, rule, gating: true }
}

interface PairSeed {
  readonly at: number
  readonly random: () => number
  readonly foreground: TokenModel
  readonly background: TokenModel
}

function pairOf({ at, random, foreground, background }: PairSeed): PairModel {
  return {
    id: `par_${at}`,
    foreground: foreground.id,
    background: background.id,
    use: USES[at % USES.length]!,
    relation: random() < 0.7 ? 'together' : 'inside',
    backdrop: [],
  }
}

/** One state over both sides: fifteen findings. */
function ownPair(seed: PairSeed): PairModel {
  return { ...pairOf(seed), relation: 'together' }
}

function pick<Item>(items: readonly Item[], random: () => number): Item {
  return items[Math.floor(random() * items.length)]!
}
