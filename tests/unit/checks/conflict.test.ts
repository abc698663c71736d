import { describe, expect, it } from 'vitest'
import { createColorProbe } from '#shared/checks/color-probe.ts'
import type { PairModel, SystemModel, TokenModel } from '#shared/checks/model.ts'
import { isGatingRow, nearestAt } from '#shared/checks/nearest-at.ts'
import { nearestColor } from '#shared/checks/nearest-color.ts'
import { nearestPassing, withColors } from '#shared/checks/nearest-passing.ts'
import { repairPlan } from '#shared/checks/repair-plan.ts'
import { requirementConflict } from '#shared/checks/requirement-conflict.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { evaluate } from './reading.ts'

const light = [theme('light')]
const others = ['label', 'page', 'ground', 'ink', 'glass', 'tint']

function colorOf(css: string) {
  const reading = parseColor(css)
  if (!reading.ok) throw new TypeError(reading.reason)
  return reading.color
}
const demand = (css: string, required: number) => ({ color: colorOf(css), required })

/** What cannot hold together of a token `fill` that alone may move. */
function conflictIn(
  tokens: readonly TokenModel[],
  pairs: readonly PairModel[],
  more: Partial<SystemModel> = {},
) {
  const model = { ...system({ themes: light, tokens, pairs }), ...more }
  const result = nearestPassing(evaluate(model), 'fill', { locked: new Set(others) })
  expect(result.outcome).toBe('none')
  return result.conflict!
}

describe('a conflict of bare colors', () => {
  const between = [demand('#ffffff', 7), demand('#333333', 4.5)]

  it('answers the demands that no chroma and no lightness meets', () => {
    expect(nearestColor(colorOf('oklch(0.6 0.15 250)'), between).conflict).toEqual([0, 1])
    expect(nearestColor(colorOf('oklch(0.6 none none)'), between).conflict).toEqual([0, 1])
  })

  it('answers none where the budget ran out before a color that meets them', () => {
    const stopped = nearestColor(colorOf('#777777'), [demand('#ffffff', 7)], 1)
    expect(stopped).toMatchObject({ conflict: [], isStopped: true })
    expect(stopped).not.toHaveProperty('found')
  })
})

describe('a conflict of requirements', () => {
  const label = token('label', '#ffffff')
  const page = token('page', '#3a3a3a')
  const both = [pair('label', 'fill'), pair('fill', 'page')]

  it('answers the same for a color without chroma as for a grey', () => {
    const missing = conflictIn([label, page, token('fill', 'oklch(0.57 none none)')], both)
    const grey = conflictIn([label, page, token('fill', 'oklch(0.57 0 none)')], both)
    expect(missing.requirements).toEqual(grey.requirements)
    expect(missing.bound!.needed).toBe(20.25)
  })

  it('leaves the bound out where the product of both is not what fails', () => {
    // Between white and black there is room for 4.58 and 4.58, whose product is 20.98, but at no lightness tried.
    const black = token('page', '#000000')
    const pairs = both.map((one) => ({ ...one, minimum: 4.581 }))
    const { requirements, bound } = conflictIn([label, black, token('fill', '#777777')], pairs)
    expect(requirements).toHaveLength(2)
    expect(bound).toBeUndefined()
  })

  it('leaves the bound out where the other side shows through or moves along', () => {
    const glass = token('glass', 'rgb(255 255 255 / 0.9)')
    const through = conflictIn(
      [glass, page, token('fill', '#777777')],
      [pair('glass', 'fill'), pair('fill', 'page')],
    )
    expect(through.requirements).toHaveLength(2)
    expect(through.bound).toBeUndefined()
    const tint = {
      ...token('tint', '#000000'),
      value: { kind: 'derived', token: 'fill', lightness: 0.3 } as const,
    }
    // White has 18 on fill up to a lightness of 0.2; fill has 3.3 to a tint lighter by 0.3 from 0.25 up.
    const along = conflictIn(
      [label, tint, token('fill', 'oklch(0.22 0 none)')],
      [
        pair('label', 'fill', { minimum: 18 }),
        pair('fill', 'tint', { use: 'non-text', minimum: 3.3 }),
      ],
    )
    expect(along.requirements).toHaveLength(2)
    expect(along.bound).toBeUndefined()
  })

  it('answers a distinct set among what cannot hold together', () => {
    const fill = token('fill', '#8a8a8a')
    const near = token('tint', '#ffffff')
    const distinctSets = [{ id: 'd', name: 'd', tokens: ['fill', 'tint'] }]
    const { requirements } = conflictIn(
      [near, page, fill],
      [pair('fill', 'page', { minimum: 9 })],
      {
        distinctSets,
      },
    )
    expect(requirements.map(({ asks }) => asks)).toEqual(['finding', 'distinct-set'])
  })

  it('answers none where a color tried does pass', () => {
    const evaluation = evaluate(
      system({
        themes: light,
        tokens: [token('fill', '#777777')],
        pairs: [pair('fill', 'ground')],
      }),
    )
    const probe = createColorProbe(evaluation, { token: 'fill', theme: 'light' })
    const asked = { isAsked: isGatingRow, budget: 100_000 }
    const { conflict, evaluations } = requirementConflict(evaluation, probe, asked)
    expect(conflict).toBeUndefined()
    expect(evaluations).toBeGreaterThan(200)
    expect(requirementConflict(evaluation, probe, { ...asked, budget: 10 })).toEqual({
      evaluations: 0,
    })
  })
})

describe('a repair plan', () => {
  const tokens = (count: number) => [
    token('label', '#ffffff'),
    token('page', '#3a3a3a'),
    ...Array.from({ length: count }, (_, at) => token(`fill${at}`, '#777777')),
  ]
  const locked = new Set(['label', 'page'])
  const pairs = (count: number) =>
    Array.from({ length: count }, (_, at) => [
      pair('label', `fill${at}`),
      pair(`fill${at}`, 'page'),
    ]).flat()

  it('answers a part of what cannot hold together, for each that moves alone', () => {
    const distinctSets = [{ id: 'd', name: 'd', tokens: ['fill0', 'ink'] }]
    const model = system({ themes: light, tokens: tokens(2), pairs: pairs(2) })
    const plan = repairPlan(evaluate({ ...model, distinctSets }), { locked })
    expect(plan.breachesBefore).toBe(4)
    expect(plan.edits.map(({ place, mends }) => [place.token, mends.length])).toEqual([
      ['fill0', 1],
      ['fill1', 1],
    ])
    expect(plan.left.map(({ reason }) => reason)).toEqual(['conflict', 'conflict'])
    expect(plan.isStopped).toBe(false)
  })

  it('answers one conflict for all that hangs on the same place', () => {
    const two = [token('label1', '#fefefe'), token('page1', '#3b3b3b')]
    const more = [pair('label1', 'fill0'), pair('fill0', 'page1')]
    const model = system({
      themes: light,
      tokens: [...tokens(1), ...two],
      pairs: [...pairs(1), ...more],
    })
    const { left } = repairPlan(evaluate(model), {
      locked: new Set([...locked, 'label1', 'page1']),
    })
    expect(left).toHaveLength(2)
    expect(left[0]!.conflict).toBeDefined()
    expect(left[1]!.conflict).toBe(left[0]!.conflict)
  })

  it('answers a stop where what is left of the budget does not tell what conflicts', () => {
    const model = system({ themes: light, tokens: tokens(1), pairs: pairs(1) })
    const whole = repairPlan(evaluate(model), { locked })
    expect(whole.left[0]).toMatchObject({ reason: 'conflict', conflict: expect.anything() })
    const less = repairPlan(evaluate(model), { locked, budget: whole.evaluations - 1 })
    expect(less).toMatchObject({ isStopped: true, left: [{ reason: 'budget' }] })
    expect(less.left[0]).not.toHaveProperty('conflict')
    expect(less.evaluations).toBeLessThan(whole.evaluations)
  })
})

describe('the nearest passing color', () => {
  it('answers one that mends a waived finding too, where that costs nothing', () => {
    const model = system({
      themes: light,
      tokens: [token('text', '#999999'), token('paper', '#ffffff'), token('page', '#eeeeee')],
      pairs: [pair('text', 'paper'), pair('text', 'page')],
    })
    const evaluation = evaluate(model)
    const [breach] = verdictOf(evaluation).findings
    const subject = { foreground: 'text', background: 'paper', kind: 'text' } as const
    const waiver = { id: 'w', ...subject, floorRatio: breach!.ratio, required: 4.5 }
    const waivers = [{ ...waiver, endsAt: '2030-01-01T00:00:00.000Z' }]
    const place = { token: 'text', theme: 'light' }
    const { found } = nearestAt(evaluation, place, { waivers })
    const mended = verdictOf(withColors(evaluation, [found!]), { waivers })
    expect(mended.counts).toMatchObject({ pass: 2, waived: 0, breach: 0 })
  })

  it('answers a state that is set by itself, where that alone breaches', () => {
    const text = token('text', '#333333', {
      states: ['hover', 'focus'],
      values: { light: { hover: value('#999999') } },
    })
    const model = system({ themes: light, tokens: [text], pairs: [pair('text', 'ground')] })
    const result = nearestPassing(evaluate(model), 'text', { locked: new Set(['ground']) })
    expect(result.outcome).toBe('found')
    expect(result.edits.map(({ place }) => place)).toEqual([
      { token: 'text', theme: 'light', state: 'hover' },
    ])
  })

  it('answers one above the floor for disabled, though its group has no requirement to meet', () => {
    const ring = pair('ring', 'ground', {
      use: 'focus-change',
      relation: 'together',
      anyOf: 'ring',
    })
    const model = system({
      themes: light,
      settings: { disabledFloor: 2 },
      tokens: [token('ring', '#dddddd', { states: ['disabled'] })],
      pairs: [ring],
    })
    const evaluation = evaluate(model)
    expect(verdictOf(evaluation).findings.map(({ reason }) => reason)).toEqual([
      undefined,
      'disabled-floor',
    ])
    const { found } = nearestAt(evaluation, { token: 'ring', theme: 'light' })
    expect(verdictOf(withColors(evaluation, [found!])).counts).toMatchObject({
      pass: 1,
      exempt: 1,
      breach: 0,
    })
  })

  it('answers nothing more once its budget is spent between two places', () => {
    const text = token('text', '#999999', { values: { dark: { rest: value('#555555') } } })
    const model = system({ tokens: [text], pairs: [pair('text', 'ground')] })
    const locked = new Set(['ground'])
    const whole = nearestPassing(evaluate(model), 'text', { locked })
    expect(whole.edits).toHaveLength(2)
    const stopped = nearestPassing(evaluate(model), 'text', { locked, budget: 1 })
    expect(stopped).toMatchObject({ outcome: 'none', edits: [], isStopped: true })
  })

  it('refuses to set a color that leaves the system unreadable', () => {
    const evaluation = evaluate(system({ themes: light }))
    const found = nearestAt(evaluation, { token: 'ground', theme: 'light' }).found!
    const clear = { ...found, color: colorOf('rgb(255 255 255 / 0.5)') }
    expect(() => withColors(evaluation, [clear])).toThrow(TypeError)
  })
})
