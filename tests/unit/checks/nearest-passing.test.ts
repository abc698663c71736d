import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { type ColorPlace, placeValue } from '#shared/checks/color-place.ts'
import { createColorProbe } from '#shared/checks/color-probe.ts'
import { applyEdits } from '#shared/checks/edits.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { SystemModel, WaiverModel } from '#shared/checks/model.ts'
import { isGatingRow, nearestAt } from '#shared/checks/nearest-at.ts'
import { nearestPassing, withColors } from '#shared/checks/nearest-passing.ts'
import { createProbeTrial } from '#shared/checks/probe-trial.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { POWERLESS_CHROMA } from '#shared/color/gamut-map.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { Dice, randomSystem } from './random-system.ts'
import { evaluate } from './reading.ts'

/** Identities that breach and gate in a full check of the system with a colour set. */
function breachesWith(model: SystemModel, place: ColorPlace, color: Oklch): Set<string> {
  const before = model.tokens.find(({ id }) => id === place.token)!
  const base = model.themes[0]!.id
  const put = placeValue(before, { ...place, base }, { kind: 'color', color })
  const { findings } = verdictOf(evaluate(applyEdits(model, { tokens: { put: [put] } })))
  const breaches = findings.filter(({ outcome, gating }) => outcome === 'breach' && gating)
  return new Set(breaches.map(({ identity }) => identity))
}

/** The least cost over a grid of colours, each tried; then over a finer one around it. */
function bruteForce(evaluation: Evaluation, place: ColorPlace): number {
  const probe = createColorProbe(evaluation, place)
  const trial = createProbeTrial(evaluation, probe, { isAsked: isGatingRow, acceptsWaivers: true })
  const { present } = probe
  const own = present.c ?? 0
  const isGrey = own <= POWERLESS_CHROMA
  let best = { cost: Number.POSITIVE_INFINITY, l: 0, c: 0 }
  const tryAll = (lightness: readonly number[], chroma: readonly number[]) => {
    for (const l of lightness) {
      for (const c of isGrey ? [own] : chroma) {
        if (l < 0 || l > 1 || c < 0) continue
        const { short, isBarred, cost } = trial({ ...present, l, c })
        if (short <= 0 && isBarred !== true && cost < best.cost) best = { cost, l, c }
      }
    }
  }
  const line = (count: number, from: number, step: number) =>
    Array.from({ length: count }, (_, at) => from + at * step)
  tryAll(line(126, 0, 0.008), line(26, 0, 0.016))
  tryAll(line(25, best.l - 0.012, 0.001), line(25, best.c - 0.024, 0.002))
  return best.cost
}

it('answers a colour as near as brute force finds, passing in a full check', () => {
  const tally = { found: 0, none: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const dice = new Dice(seed)
      const model = randomSystem(dice, 6)
      const checked = checkSystem(model)
      if (!checked.ok) return
      const { evaluation } = checked
      const place = { token: dice.pick(model.tokens).id, theme: dice.pick(model.themes).id }
      const { found, isStopped, probe } = nearestAt(evaluation, place)
      if (isStopped) return
      const least = bruteForce(evaluation, place)
      if (found === undefined) {
        expect(least).toBe(Number.POSITIVE_INFINITY)
        tally.none++
        return
      }
      expect(found.deltaEOk).toBeLessThanOrEqual(least + 0.002)
      const breaches = breachesWith(model, place, found.color)
      const asked = probe.rows.filter(isGatingRow).map(({ finding }) => finding.identity)
      expect(asked.filter((identity) => breaches.has(identity))).toEqual([])
      tally.found++
    }),
    // The search is no proof: the same systems on every run, more of them by hand.
    { numRuns: 70, seed: 20261201 },
  )
  for (const [what, seen] of Object.entries(tally)) expect(seen, what).toBeGreaterThan(10)
}, 180_000)

const light = [theme('light')]
const grey = (text: string, background = '#ffffff') =>
  system({
    themes: light,
    tokens: [token('text', text), token('paper', background)],
    pairs: [pair('text', 'paper')],
  })

it('answers the lightest grey that has 4.5 on white, #767676 by WCAG', () => {
  const result = nearestPassing(evaluate(grey('#999999')), 'text')
  expect(result).toMatchObject({ outcome: 'found', side: 'own', isStopped: false })
  const { evaluation } = { evaluation: withColors(evaluate(grey('#999999')), result.edits) }
  const [finding] = verdictOf(evaluation).findings
  // w3c/wcag understanding/21/non-text-contrast.html names it.
  expect(finding!.rendered.foreground).toBe('#767676')
})

it('leaves hue and alpha as they are, and a token that passes alone', () => {
  const blue = evaluate(grey('oklch(0.75 0.12 243 / 0.9)'))
  const [edit] = nearestPassing(blue, 'text').edits
  expect(edit!.color).toMatchObject({ h: 243, alpha: 0.9 })
  const passing = nearestPassing(evaluate(grey('#111')), 'text')
  expect(passing).toMatchObject({ outcome: 'passing', edits: [], breaches: [] })
})

it('answers an override where one theme alone breaches, and the source where all do', () => {
  const tokens = (dark: string) => [
    token('text', '#5a5a5a', { values: { dark: { rest: value(dark) } } }),
  ]
  const pairs = [pair('text', 'ground')]
  const inDark = nearestPassing(evaluate(system({ tokens: tokens('#444444'), pairs })), 'text')
  expect(inDark.edits.map(({ place }) => place)).toEqual([{ token: 'text', theme: 'dark' }])
  const kept = system({ tokens: [token('text', '#858585', {})], pairs })
  const both = nearestPassing(evaluate(kept), 'text')
  // No grey has 4.5 on both grounds, so each theme gets its own.
  expect(both.edits.map(({ place }) => place.theme)).toEqual(['dark', 'light'])
})

it('answers the other side of the pair where the token is locked or cannot', () => {
  const model = grey('#999999')
  const evaluation = evaluate(model)
  const locked = nearestPassing(evaluation, 'text', { locked: new Set(['text']) })
  expect(locked).toMatchObject({ outcome: 'found', side: 'other' })
  expect(locked.edits.map(({ place }) => place.token)).toEqual(['paper'])
  const all = nearestPassing(evaluation, 'text', { locked: new Set(['text', 'paper']) })
  expect(all).toMatchObject({ outcome: 'locked', edits: [] })
})

it('answers what cannot hold together, with where each holds and the bound between them', () => {
  const model = system({
    themes: light,
    tokens: [token('label', '#ffffff'), token('fill', 'oklch(0.6 0 0)')],
    pairs: [
      pair('label', 'fill', { id: 'label' }),
      pair('fill', 'ground', { id: 'fill' }),
      pair('ink', 'fill', { id: 'ink' }),
    ],
  })
  const locked = new Set(['label', 'ground', 'ink'])
  const result = nearestPassing(evaluate(model), 'fill', { locked })
  expect(result.outcome).toBe('none')
  const [first, second] = result.conflict!.requirements
  expect([first!.finding!.pair, second!.finding!.pair]).toEqual(['label', 'ink'])
  expect(first!.lightness).toEqual([{ from: 0, to: 0.565 }])
  expect(second!.lightness).toEqual([{ from: expect.closeTo(0.625, 1), to: 1 }])
  expect(result.conflict!.bound!.needed).toBe(20.25)
})

it('answers the bound of text on a ground and under white: 20.25, more than white has there', () => {
  const model = system({
    themes: light,
    tokens: [token('label', '#ffffff'), token('fill', '#777777'), token('page', '#3a3a3a')],
    pairs: [pair('label', 'fill', { id: 'label' }), pair('fill', 'page', { id: 'fill' })],
  })
  const locked = new Set(['label', 'page'])
  const { conflict } = nearestPassing(evaluate(model), 'fill', { locked })
  expect(conflict!.requirements).toHaveLength(2)
  expect(conflict!.bound!.needed).toBe(20.25)
  expect(conflict!.bound!.available).toBeCloseTo(11.37, 1)
})

it('answers a stop where the budget runs out, with the best so far', () => {
  const stopped = nearestPassing(evaluate(grey('#999999')), 'text', { budget: 30 })
  expect(stopped.isStopped).toBe(true)
  expect(stopped.evaluations).toBeLessThanOrEqual(30)
})

it('answers heavier colours as more evaluations: one for each hundred values and findings', () => {
  const tokens = Array.from({ length: 300 }, (_, at) => token(`t${at}`, '{text}'))
  const model = grey('#999999')
  const heavy = evaluate({ ...model, tokens: [...model.tokens, ...tokens] })
  const place = { token: 'text', theme: 'light' }
  // The token, its 300 followers and its one finding.
  expect(createColorProbe(heavy, place).weight).toBe(4)
  expect(createColorProbe(evaluate(model), place).weight).toBe(1)
  const alone = nearestAt(evaluate(model), place).evaluations
  expect(nearestAt(heavy, place).evaluations).toBe(4 * alone)
})

it('leaves a waived finding short only where passing is not free', () => {
  const model = grey('#999999')
  const [breach] = verdictOf(evaluate(model)).findings
  const waiver: WaiverModel = {
    id: 'w',
    foreground: 'text',
    background: 'paper',
    kind: 'text',
    floorRatio: breach!.ratio,
    required: 4.5,
    endsAt: '2030-01-01T00:00:00.000Z',
  }
  const evaluation = evaluate(model)
  const result = nearestPassing(evaluation, 'text', { waivers: [waiver] })
  expect(result.outcome).toBe('passing')
  const at = nearestAt(evaluation, { token: 'text', theme: 'light' }, { waivers: [waiver] })
  expect(at.found!.deltaEOk).toBe(0)
})

it('leaves every distinct set as far apart as it was', () => {
  const tokens = [token('a', 'oklch(0.62 0.14 30)'), token('b', 'oklch(0.5 0.14 30)')]
  const pairs = [pair('a', 'ground')]
  const plain = system({ themes: light, tokens, pairs })
  const free = nearestAt(evaluate(plain), { token: 'a', theme: 'light' })
  const watched = { ...plain, distinctSets: [{ id: 'd', name: 'd', tokens: ['a', 'b'] }] }
  const kept = nearestAt(evaluate(watched), { token: 'a', theme: 'light' })
  expect(free.found!.color.l).toBeGreaterThan(0.5)
  expect(free.found!.color.l).toBeLessThan(0.62)
  // Between a and b there is no room: the way leads past b, or gives up chroma.
  expect(kept.found!.deltaEOk).toBeGreaterThan(free.found!.deltaEOk + 0.02)
})

it('refuses a token that the system does not have', () => {
  expect(() => nearestPassing(evaluate(grey('#999999')), 'gone')).toThrow(TypeError)
})
