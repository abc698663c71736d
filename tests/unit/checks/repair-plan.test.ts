import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { placeValue } from '#shared/checks/color-place.ts'
import { applyEdits } from '#shared/checks/edits.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { type RepairPlan, repairPlan } from '#shared/checks/repair-plan.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { Dice, randomSystem } from './random-system.ts'
import { evaluate } from './reading.ts'

/** The gating breaches of a full check of the model with a plan carried out edit by edit. */
function breachesAfter(model: SystemModel, plan: Pick<RepairPlan, 'edits'>): string[] {
  const base = model.themes[0]!.id
  let repaired = model
  for (const { place, color } of plan.edits) {
    const before = repaired.tokens.find(({ id }) => id === place.token)!
    const put = placeValue(before, { ...place, base }, { kind: 'color', color })
    repaired = applyEdits(repaired, { tokens: { put: [put] } })
  }
  const { findings } = verdictOf(evaluate(repaired))
  return findings
    .filter(({ outcome, gating }) => outcome === 'breach' && gating)
    .map(({ identity }) => identity)
}

it('answers plans that a full check confirms: nothing breaches but what is left, and nothing newly', () => {
  const tally = { repaired: 0, partly: 0, unmoved: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const dice = new Dice(seed)
      const model = randomSystem(dice, 3)
      const checked = checkSystem(model)
      if (!checked.ok) return
      const locked = new Set(dice.some(model.tokens, 0.2).map(({ id }) => id))
      const plan = repairPlan(checked.evaluation, { locked, budget: 6000 })
      const before = breachesAfter(model, { edits: [] })
      const after = breachesAfter(model, plan)
      expect(after.toSorted()).toEqual(plan.left.map(({ finding }) => finding.identity).toSorted())
      expect(plan.breachesBefore).toBe(before.length)
      expect(after.filter((identity) => !before.includes(identity))).toEqual([])
      expect(plan.edits.every(({ place }) => !locked.has(place.token))).toBe(true)
      expect(plan.edits.flatMap(({ mends }) => mends).toSorted()).toEqual(
        before.filter((identity) => !after.includes(identity)).toSorted(),
      )
      expect(plan.after.verdict).toBe(after.length === 0 ? 'pass' : 'fail')
      for (const edit of plan.edits) {
        const edits = plan.edits.filter((other) => other !== edit)
        expect(breachesAfter(model, { edits }).length).toBeGreaterThan(after.length)
      }
      if (after.length === 0 && before.length > 0) tally.repaired++
      else if (after.length < before.length) tally.partly++
      else tally.unmoved++
    }),
    { numRuns: 25 },
  )
  for (const [what, seen] of Object.entries(tally)) expect(seen, what).toBeGreaterThan(0)
}, 180_000)

// Systems in which a later edit makes an earlier one needless, and in which a step would bring a breach of its own.
it.each([68, 106, 117])(
  'answers no edit that is needless, and none that breaches anew: %i',
  (seed) => {
    const model = randomSystem(new Dice(seed), 3)
    const plan = repairPlan(evaluate(model), { budget: 3000 })
    const before = breachesAfter(model, { edits: [] })
    const after = breachesAfter(model, plan)
    expect(plan.edits.length).toBeGreaterThan(0)
    expect(after.length).toBeLessThan(before.length)
    expect(after.filter((identity) => !before.includes(identity))).toEqual([])
    for (const edit of plan.edits) {
      const edits = plan.edits.filter((other) => other !== edit)
      expect(breachesAfter(model, { edits }).length).toBeGreaterThan(after.length)
    }
  },
)

const light = [theme('light')]

it('answers one edit of the token on which most breaches hang', () => {
  const model = system({
    themes: light,
    tokens: [
      token('quay', '#8f8f8f'),
      token('one', '{quay}'),
      token('two', '{quay}'),
      token('paper', '#ffffff'),
    ],
    pairs: [pair('one', 'paper'), pair('two', 'ground'), pair('quay', 'paper')],
  })
  const plan = repairPlan(evaluate(model))
  expect(plan.edits.map(({ place }) => place)).toEqual([
    { token: 'quay', theme: 'light', state: 'rest' },
  ])
  expect(plan.edits[0]!.mends).toHaveLength(3)
  expect(plan).toMatchObject({ left: [], breachesBefore: 3, isStopped: false })
  expect(plan.after.counts.breach).toBe(0)
})

it('answers what it leaves, and why: locked, or requirements that cannot hold together', () => {
  const tokens = [token('label', '#ffffff'), token('fill', '#777777'), token('page', '#3a3a3a')]
  const pairs = [pair('label', 'fill'), pair('fill', 'page')]
  const model = system({ themes: light, tokens, pairs })
  const held = repairPlan(evaluate(model), { locked: new Set(['label', 'fill', 'page']) })
  expect(held.edits).toEqual([])
  expect(new Set(held.left.map(({ reason }) => reason))).toEqual(new Set(['locked']))
  const between = repairPlan(evaluate(model), { locked: new Set(['label', 'page']) })
  expect(between.left).toHaveLength(1)
  expect(between.left[0]).toMatchObject({ reason: 'conflict' })
  expect(between.left[0]!.conflict!.bound!.needed).toBe(20.25)
  const free = repairPlan(evaluate(model))
  expect(free.left).toEqual([])
})

it('leaves a system in which nothing gating breaches as it is', () => {
  const reported = system({
    themes: [theme('light'), theme('night', { gating: false })],
    tokens: [
      token('ground', '#ffffff', { values: { night: { rest: value('#101010') } } }),
      token('ink', '#101010', { values: { night: { rest: value('#ffffff') } } }),
      token('text', '#111111'),
    ],
    pairs: [pair('text', 'ground')],
  })
  const { tokens, ...rest } = reported
  const model = { ...rest, tokens: tokens.slice(2) }
  expect(repairPlan(evaluate(model))).toMatchObject({ edits: [], left: [], evaluations: 0 })
})

it('answers a stop where the budget runs out, and what it could not look at', () => {
  const tokens = Array.from({ length: 6 }, (_, at) => token(`t${at}`, '#999999'))
  const pairs = tokens.map(({ id }) => pair(id, 'ground'))
  const model = system({ themes: light, tokens, pairs })
  const plan = repairPlan(evaluate(model), { locked: new Set(['ground']), budget: 500 })
  expect(plan.isStopped).toBe(true)
  expect(plan.evaluations).toBeLessThanOrEqual(500)
  expect(plan.left.length).toBeGreaterThan(0)
  expect(plan.left.every(({ reason }) => reason === 'budget')).toBe(true)
})
