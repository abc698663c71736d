import { describe, expect, it } from 'vitest'
import { ratioOn } from '#shared/checks/layers.ts'
import type { PairModel, SystemModel } from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { type RenderedColor, renderColor } from '#shared/color/render.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { naiveRatio, paintAll } from './naive-contrast.ts'
import { naiveRendering } from './naive-rendering.ts'
import { naiveFindings } from './naive-verdict.ts'
import { emptyPairTally, holdPairs } from './pair-agreement.ts'
import { findings } from './reading.ts'

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
    const pairs = ids.flatMap((foreground, at) =>
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
    expect(held(on(pairs, settings))).toHaveLength(36)
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
    ]
    const settings = { p3: true, p3Gates: true }
    const all = held(on(pairs, settings))
    expect(new Set(all.map(({ basis }) => basis))).toEqual(new Set(['srgb', 'p3']))
    const aimed = all
      .filter(({ ratio, required }) => ratio > required)
      .map((one) => {
        const of = pairs.find(({ id }) => id === one.pairs[0])!
        return { ...of, minimum: one.ratio + 1e-9 }
      })
    const tight = held(on(aimed, settings))
    expect(tight.length).toBeGreaterThan(1)
    for (const one of tight) expect(one).toMatchObject({ outcome: 'breach', tight: true })
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
})
