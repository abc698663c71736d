import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { type ColorPlace, placeValue } from '#shared/checks/color-place.ts'
import { createColorProbe } from '#shared/checks/color-probe.ts'
import { applyEdits } from '#shared/checks/edits.ts'
import { DERIVED_STATES, STATES, type SystemModel, type WaiverModel } from '#shared/checks/model.ts'
import { chipOf, shadeCard } from '#shared/checks/shade-card.ts'
import { shadeGrid } from '#shared/checks/shade-grid.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { Dice, randomSystem } from './random-system.ts'
import { evaluate } from './reading.ts'

/** What a full check of the system with a colour set in a place says: its breaches with their ratios, or its faults. */
function fullCheck(
  model: SystemModel,
  place: ColorPlace,
  tried: { readonly color: Oklch; readonly waivers: readonly WaiverModel[] },
) {
  const base = model.themes[0]!.id
  const before = model.tokens.find(({ id }) => id === place.token)!
  const placed = placeValue(before, { ...place, base }, { kind: 'color', color: tried.color })
  const checked = checkSystem(applyEdits(model, { tokens: { put: [placed] } }))
  if (!checked.ok) return { faults: checked.faults, breaches: [] }
  const { findings } = verdictOf(checked.evaluation, { waivers: tried.waivers })
  const breaches = findings.filter(({ outcome }) => outcome === 'breach')
  return {
    faults: [],
    breaches: breaches.map(({ identity, ratio, required }) => ({ identity, ratio, required })),
  }
}

function randomWaivers(dice: Dice, model: SystemModel): WaiverModel[] {
  return verdictOf(evaluate(model))
    .findings.filter(({ outcome }) => outcome === 'breach' && dice.chance(0.3))
    .map(({ foreground, background, kind, required, ratio }, at) => {
      const endsAt = '2030-01-01T00:00:00.000Z'
      const floorRatio = ratio * dice.pick([0.8, 1])
      return { id: `w${at}`, foreground, background, kind, required, floorRatio, endsAt }
    })
}

function randomColors(dice: Dice, present: Oklch): Oklch[] {
  const grid = shadeGrid({ center: present, zoom: dice.pick(['wide', 'close', 'fine']) })
  const chips = grid.colors.flat().filter((color) => color !== undefined)
  const anywhere = { l: dice.next(), c: dice.next() * 0.4, h: dice.upTo(360), alpha: present.alpha }
  return [
    present,
    anywhere,
    ...Array.from({ length: 3 }, () => dice.pick([...chips, ...grid.hues])),
  ]
}

it('answers each chip exactly as a full check of the system with its colour does', () => {
  const tally = { chips: 0, breaching: 0, whole: 0, refused: 0, waived: 0, following: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const dice = new Dice(seed)
      const model = randomSystem(dice)
      const checked = checkSystem(model)
      if (!checked.ok) return
      const { evaluation } = checked
      const waivers = dice.chance(0.5) ? randomWaivers(dice, model) : []
      const place = {
        token: dice.pick(model.tokens).id,
        theme: dice.pick(model.themes).id,
        ...(dice.chance(0.2) ? { state: dice.pick(STATES) } : {}),
      }
      const probe = createColorProbe(evaluation, place, { waivers })
      const reached = new Set(probe.rows.map(({ finding }) => finding.identity))
      const still = verdictOf(probe.evaluation, { waivers }).findings.filter(
        ({ identity, outcome }) => outcome === 'breach' && !reached.has(identity),
      )
      if (probe.values.tokens.length > 1) tally.following++
      for (const color of randomColors(dice, probe.present)) {
        const chip = chipOf(probe, color)
        const full = fullCheck(model, place, { color, waivers })
        expect(chip.faults).toEqual(full.faults)
        tally[chip.outcome]++
        tally.chips++
        if (full.faults.length > 0) continue
        const told = [
          ...chip.breaches.map(({ finding: { identity, required }, ratio }) => ({
            identity,
            ratio,
            required,
          })),
          ...still.map(({ identity, ratio, required }) => ({ identity, ratio, required })),
        ]
        const byIdentity = (a: { identity: string }, b: { identity: string }) =>
          a.identity < b.identity ? -1 : 1
        expect(told.toSorted(byIdentity)).toEqual(full.breaches.toSorted(byIdentity))
        tally.waived += probe.outcomes.filter((outcome) => outcome === 2).length
      }
    }),
    { numRuns: 300 },
  )
  expect(tally.chips).toBeGreaterThan(600)
  for (const [what, seen] of Object.entries(tally)) expect(seen, what).toBeGreaterThan(5)
}, 120_000)

const card = system({
  tokens: [
    token('action', 'oklch(0.585 0.128 243)', { states: DERIVED_STATES }),
    token('label', '#ffffff'),
    token('chosen', '{action}'),
  ],
  themes: [theme('light'), theme('dark', { rule: { kind: 'mirror' } })],
  pairs: [
    pair('label', 'action', { relation: 'together', themes: ['light'] }),
    pair('chosen', 'ground', { use: 'non-text' }),
  ],
})

it('answers the present colour in the middle, lightness across, chroma down from grey', () => {
  const { grid, chips } = shadeCard(
    evaluate(card),
    { token: 'action', theme: 'light' },
    { zoom: 'wide' },
  )
  expect(grid.center).toEqual({ row: 8, column: 10 })
  const present = chips[8]![10]!
  expect(present.color).toMatchObject({ l: 0.585, c: 0.128, h: 243, alpha: 1 })
  expect(present.hex).toBe('#2283c1')
  expect(chips).toHaveLength(13)
  expect(chips[0]!.map((chip) => chip!.color.l!.toFixed(3)).join(' ')).toBe(
    '0.385 0.405 0.425 0.445 0.465 0.485 0.505 0.525 0.545 0.565 0.585 0.605 0.625 0.645 0.665 0.685 0.705 0.725 0.745 0.765 0.785',
  )
  expect(grid.chroma.map((c) => c.toFixed(3)).join(' ')).toBe(
    '0.000 0.016 0.032 0.048 0.064 0.080 0.096 0.112 0.128 0.144 0.160 0.176 0.192',
  )
})

it('answers which requirement a breaching chip falls furthest short of, through an alias too', () => {
  const { chips } = shadeCard(evaluate(card), { token: 'action', theme: 'light' }, { zoom: 'wide' })
  const row = chips[0]!.map((chip) => [chip!.outcome, chip!.breaches[0]?.finding.foreground])
  expect(row.at(-1)).toEqual(['breaching', 'label'])
  expect(row[10]).toEqual(['breaching', 'label'])
  expect(row[0]).toEqual(['whole', undefined])
})

it('answers what sRGB cannot hold, and what Display P3 cannot', () => {
  const { chips } = shadeCard(evaluate(card), { token: 'action', theme: 'light' }, { zoom: 'wide' })
  const gamuts = chips.map((row) => row[10]!.gamut)
  expect(gamuts.slice(0, 9)).toEqual(new Array(9).fill('srgb'))
  expect(gamuts.slice(9)).toEqual(['p3', 'p3', 'p3', 'beyond'])
})

it('answers a finer card around a chip, and leaves out what no lightness has', () => {
  const fine = shadeGrid({
    center: { l: 0.995, c: 0.004, h: null, alpha: 1 },
    zoom: 'close',
    columns: 11,
    rows: 7,
  })
  expect(fine.center).toEqual({ row: 1, column: 5 })
  expect(fine.colors[1]![5]).toEqual({ l: 0.995, c: 0.004, h: null, alpha: 1 })
  expect(fine.colors[0]!.map((color) => color?.l?.toFixed(3))).toEqual([
    '0.970',
    '0.975',
    '0.980',
    '0.985',
    '0.990',
    '0.995',
    '1.000',
    ...new Array(4).fill(undefined),
  ])
  expect(fine.hues[0]!.h).toBe(335)
})

it('refuses a chip with which a theme loses its ink', () => {
  const { chips } = shadeCard(
    evaluate(card),
    { token: 'ink', theme: 'light' },
    { zoom: 'wide', center: { l: 0.6, c: 0, h: null, alpha: 1 } },
  )
  const outcomes = chips[0]!.map((chip) => chip!.outcome)
  expect(outcomes.at(0)).toBe('whole')
  expect(outcomes.at(-1)).toBe('refused')
  expect(chips[0]!.at(-1)!.faults[0]!.code).toBe('theme-span')
})

it('refuses a place that the system does not have', () => {
  const evaluation = evaluate(card)
  expect(() => createColorProbe(evaluation, { token: 'no', theme: 'light' })).toThrow(TypeError)
  expect(() => createColorProbe(evaluation, { token: 'ink', theme: 'no' })).toThrow(TypeError)
})

it('leaves an override of one theme out of what a shade of another moves', () => {
  const model = system({
    tokens: [token('a', '#777777', { values: { dark: { rest: value('#777777') } } })],
    pairs: [pair('a', 'ground')],
  })
  const light = createColorProbe(evaluate(model), { token: 'a', theme: 'light' })
  expect(light.rows.map(({ finding }) => finding.theme)).toEqual(['light'])
})
