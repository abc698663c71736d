import { describe, expect, it } from 'vitest'
import { ratioOn } from '#shared/checks/layers.ts'
import { measurePair } from '#shared/checks/measure-pair.ts'
import type { PairModel, SystemModel } from '#shared/checks/model.ts'
import { mappedChroma } from '#shared/color/gamut-map.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { type RenderedColor, renderColor } from '#shared/color/render.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { naiveRatio, paintAll } from './naive-contrast.ts'
import { naiveMappedChroma, naiveRendering } from './naive-rendering.ts'
import { naiveFindings } from './naive-verdict.ts'
import { emptyPairTally, holdPairs } from './pair-agreement.ts'
import { evaluate, findings } from './reading.ts'

// The naive verdict and rendering are written from the specification alone and share no arithmetic with the engine.

function renderedOf(css: string): RenderedColor {
  const reading = parseColor(css)
  if (!reading.ok) throw new Error(reading.reason)
  return renderColor(reading.color)
}

/** Holds every finding against the naive verdict, and answers them. */
function held(model: SystemModel) {
  const wanted = new Map(naiveFindings(model).map((one) => [one.identity, one]))
  const all = findings(model)
  expect(all.length).toBe(wanted.size)
  for (const { identity, ratio, required, basis, outcome, reason, tight, use } of all) {
    const { ratio: naive, ...rest } = wanted.get(identity)!
    expect({ identity, required, basis, outcome, reason, tight: tight === true, use }).toEqual(rest)
    expect(ratio).toBeCloseTo(naive, 10)
  }
  return all
}

const VEILS = {
  plain: 'oklch(0.4 0.08 20 / 0.9)',
  green: 'oklch(0.75 0.3 145 / 0.95)',
  night: 'oklch(0.3 0.2 285 / 0.97)',
  pale: 'oklch(0.93 0.05 95 / 0.85)',
  glass: 'rgb(20 60 200 / 0.5)',
  solid: 'oklch(0.5 0.25 30)',
} as const
const BOTH = { p3: true, p3Gates: true }

const on = (pairs: readonly PairModel[], settings: { p3: boolean; p3Gates: boolean }) =>
  system({
    themes: [theme('light')],
    settings,
    tokens: Object.entries(VEILS).map(([id, css]) => token(id, css)),
    pairs,
  })

describe('a stack of layers', () => {
  it('answers drawn pairs as a naive verdict does, ratio, basis, outcome and tightness', () => {
    const tally = emptyPairTally()
    for (let seed = 901; seed <= 906; seed++) holdPairs(seed, 40, tally)
    expect(tally.translucent).toBeGreaterThan(80)
    for (const seen of [tally.p3, tally.breaches, tally.near]) expect(seen).toBeGreaterThan(5)
  })

  it.each([
    { p3: true, p3Gates: true },
    { p3: true, p3Gates: false },
    { p3: false, p3Gates: true },
  ])('answers every order of three veils on each other, $p3 $p3Gates', (settings) => {
    const ids = Object.keys(VEILS)
    const uses = ['text', 'link-in-text', 'non-text', 'focus-adjacent'] as const
    const stacks = ids.flatMap((foreground, at) =>
      ids.map((background, next) =>
        pair(foreground, background, {
          use: uses[(at + next) % 4]!,
          backdrop: [ids[(at + 2 * next) % 6]!, ids[(2 * at + next) % 6]!].slice(
            0,
            (at + next) % 3,
          ),
        }),
      ),
    )
    const all = held(on(stacks, settings))
    expect(all).toHaveLength(36)
    // The same with a minimum at, just under and just over each ratio: what a level moves has to flip the verdict.
    for (const by of [0, -1e-9, 1e-9]) {
      const aimed = stacks.flatMap((one, at) => {
        const { ratio, required } = all[at]!
        return ratio + by > required ? [{ ...one, minimum: ratio + by }] : []
      })
      const outcomes = held(on(aimed, settings)).map(({ outcome }) => outcome)
      expect(new Set(outcomes)).toEqual(new Set([by > 0 ? 'breach' : 'pass']))
    }
  })

  it('answers each theme on its own ground and backdrop, with what is seen through them', () => {
    const glass = token('glass', 'rgb(120 40 20 / 0.6)', { states: ['hover'] })
    const sheet = token('sheet', 'rgb(250 250 250 / 0.4)', {
      values: { dark: { rest: value('rgb(10 20 40 / 0.4)') } },
    })
    const pairs = [
      pair('ink', 'glass'),
      pair('glass', 'sheet', { use: 'non-text' }),
      pair('glass', 'sheet', { id: 'on ink', use: 'focus-adjacent', backdrop: ['ink', 'sheet'] }),
    ]
    const model = system({ settings: BOTH, tokens: [glass, sheet], pairs })
    const all = held(model)
    expect(all).toHaveLength(2 * 3 * 2)
    const [, , third] = pairs
    expect([...measurePair(evaluate(model).resolved, third!).ratio]).toEqual(
      all.filter(({ use }) => use === 'focus-adjacent').map(({ ratio }) => ratio),
    )
  })

  it('answers P3 and tightness by what can be seen, not by layers without opacity', () => {
    const clear = token('clear', 'rgb(0 0 0 / 0)')
    const base = on([], BOTH)
    const one = (declared: PairModel) => {
      const [finding] = held({ ...base, tokens: [...base.tokens, clear], pairs: [declared] })
      return ['p3' in finding!.ratios, finding!.tight === true]
    }
    const unknown = { backdrop: 'unknown' } as const
    expect(one(pair('clear', 'solid'))).toEqual([true, false])
    expect(one(pair('clear', 'ink', { backdrop: ['glass'] }))).toEqual([false, false])
    expect(one(pair('ink', 'clear', unknown))).toEqual([false, false])
    expect(one(pair('ink', 'clear', { backdrop: ['glass'] }))[0]).toBe(true)
    expect(one(pair('clear', 'clear', { use: 'focus-change' }))).toEqual([false, false])
  })

  it('answers the least over an unknown backdrop, on the basis that is lower, and what one level flips', () => {
    const unknown = (foreground: string, background: string, more: Partial<PairModel> = {}) =>
      pair(foreground, background, { backdrop: 'unknown', ...more })
    const pairs = [
      unknown('pale', 'night'),
      unknown('ground', 'plain'),
      unknown('solid', 'pale', { use: 'link-in-text' }),
      unknown('green', 'night', { use: 'focus-adjacent' }),
      unknown('ink', 'green'),
      unknown('glass', 'pale', { use: 'non-text' }),
      unknown('glass', 'solid', { use: 'focus-adjacent' }),
      unknown('glass', 'solid', { use: 'non-text' }),
    ]
    const all = held(on(pairs, BOTH))
    expect(new Set(all.map(({ basis }) => basis))).toEqual(new Set(['srgb', 'p3']))
    for (const by of [1e-9, -1e-9]) {
      const aimed = pairs.flatMap((of, at) => {
        const { ratio, required } = all[at]!
        return ratio + by > required ? [{ ...of, minimum: ratio + by }] : []
      })
      const tight = held(on(aimed, BOTH))
      expect(tight.length).toBeGreaterThan(1)
      for (const one of tight) {
        expect(one).toMatchObject({ outcome: by > 0 ? 'breach' : 'pass', tight: true })
      }
    }
  })

  it('answers the ratio of a color on a reference on a ground, each seen through', () => {
    const ground = renderedOf('#f4e8d8')
    for (const upper of Object.values(VEILS)) {
      for (const lower of Object.values(VEILS)) {
        const [color, reference] = [renderedOf(upper), renderedOf(lower)]
        const under = paintAll([ground, reference], 'srgb')
        const over = paintAll([ground, reference, color], 'srgb')
        const ratio = ratioOn(color, { reference, ground })
        expect(ratio).toBeCloseTo(naiveRatio(over, under, 'srgb'), 12)
      }
    }
  })
})

describe('a rendered color', () => {
  it('answers the bytes and the gamut of a naive mapping, over the whole of OKLCH', () => {
    const gamuts = new Set<string>()
    for (let at = 0; at < 360; at++) {
      const color: Oklch = {
        l: ((at * 37) % 101) / 100,
        c: ((at * 17) % 41) / 100,
        h: (at * 47) % 360,
        alpha: ((at * 7) % 11) / 10,
      }
      const rendered = renderColor(color)
      expect(rendered).toEqual(naiveRendering(color))
      gamuts.add(rendered.gamut)
    }
    expect(gamuts).toEqual(new Set(['srgb', 'p3', 'beyond']))
  })

  it('answers the chroma that a naive mapping leaves, to the last steps of the search', () => {
    for (let at = 0; at < 200; at++) {
      const [l, c, h] = [((at * 37) % 101) / 100, 0.02 + ((at * 17) % 41) / 100, (at * 47) % 360]
      expect(mappedChroma(l, c, h)).toBeCloseTo(naiveMappedChroma(l, c, h), 9)
    }
    for (const l of [0, 1]) {
      expect(mappedChroma(l, 0.3, 20)).toBeCloseTo(0, 6)
      expect(mappedChroma(l, 0, 20)).toBe(0)
    }
  })
})
