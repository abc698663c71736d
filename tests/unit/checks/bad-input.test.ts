import { describe, expect, it } from 'vitest'
import { createColorProbe } from '#shared/checks/color-probe.ts'
import { measureDistinctSets } from '#shared/checks/distinct-measure.ts'
import { nearestPassing } from '#shared/checks/nearest-passing.ts'
import { repairPlan } from '#shared/checks/repair-plan.ts'
import { shadeCard } from '#shared/checks/shade-card.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { readoutsOf } from '#shared/color/readouts.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { evaluate, faultsOf, resolve } from './reading.ts'

const light = [theme('light')]
const plain = system({
  themes: light,
  tokens: [token('text', '#999999')],
  pairs: [pair('text', 'ground')],
})

describe('colours that are none', () => {
  const good: Oklch = { l: 0.5, c: 0.1, h: 200, alpha: 1 }

  it.each([
    ['lightness above 1', { l: 1.0001 }],
    ['lightness below 0', { l: -0.0001 }],
    ['lightness NaN', { l: Number.NaN }],
    ['chroma below 0', { c: -0.01 }],
    ['chroma Infinity', { c: Number.POSITIVE_INFINITY }],
    ['hue NaN', { h: Number.NaN }],
    ['hue Infinity', { h: Number.POSITIVE_INFINITY }],
    ['alpha above 1', { alpha: 1.5 }],
    ['alpha NaN', { alpha: Number.NaN }],
  ])('refuses to try %s, and leaves the probe as it was', (_, members) => {
    const probe = createColorProbe(evaluate(plain), { token: 'text', theme: 'light' })
    probe.set(good)
    const before = [...probe.ratios]
    expect(() => probe.set({ ...good, ...members })).toThrow(TypeError)
    expect([...probe.ratios]).toEqual(before)
  })

  it.each(['oklch(NaN 0 0)', 'oklch(Infinity 0 0)', 'oklch(0.5 0.1 1e999)', 'rgb(none none)'])(
    'refuses %s in one sentence',
    (text) => {
      const reading = parseColor(text)
      expect(reading.ok ? '' : reading.reason).toMatch(/^[A-Z"a-z].+\.$/)
    },
  )

  it('answers none, alpha 0 and alpha 1 as components that count as 0, are clear, or opaque', () => {
    const probe = createColorProbe(evaluate(plain), { token: 'text', theme: 'light' })
    probe.set({ l: null, c: null, h: null, alpha: 1 })
    expect(probe.ratios[0]).toBeGreaterThan(15)
    probe.set({ ...good, alpha: 0 })
    expect(probe.ratios[0]).toBe(1)
    probe.set({ ...good, alpha: null })
    expect(probe.ratios[0]).toBe(1)
  })

  it('answers a hue of 360 and more as the one it wraps to', () => {
    for (const [turn, plainHue] of [
      ['oklch(0.6 0.1 360)', 'oklch(0.6 0.1 0)'],
      ['oklch(0.6 0.1 -30)', 'oklch(0.6 0.1 330)'],
      ['oklch(0.6 0.1 770deg)', 'oklch(0.6 0.1 50)'],
    ] as const) {
      const [a, b] = [parseColor(turn), parseColor(plainHue)]
      if (!a.ok || !b.ok) throw new Error('unread')
      expect(readoutsOf(a.color).shipped).toEqual(readoutsOf(b.color).shipped)
    }
  })
})

describe('systems at their edges', () => {
  const chain = (links: number) =>
    system({
      themes: light,
      tokens: [
        token('a0', '#999999'),
        ...Array.from({ length: links }, (_, at) => token(`a${at + 1}`, `{a${at}}`)),
      ],
      pairs: [pair(`a${links}`, 'ground')],
    })

  it('answers through 32 aliases one after another, and refuses 33 as a fault', () => {
    const result = nearestPassing(evaluate(chain(32)), 'a0')
    expect(result).toMatchObject({ outcome: 'found', side: 'own' })
    expect(repairPlan(evaluate(chain(32))).left).toEqual([])
    expect(faultsOf(chain(33)).map(({ code }) => code)).toContain('alias-depth')
  })

  it('refuses a theme whose ground is translucent, as a fault and as a shade', () => {
    const veiled = system({ themes: light, tokens: [] })
    const ground = { ...veiled.tokens[0]!, value: value('#ffffff80') }
    const model = { ...veiled, tokens: [ground, ...veiled.tokens.slice(1)] }
    expect(faultsOf(model).map(({ code }) => code)).toEqual(['theme-span'])
    const { chips } = shadeCard(
      evaluate(veiled),
      { token: 'ground', theme: 'light' },
      { zoom: 'wide', center: { l: 0.9, c: 0, h: null, alpha: 0.5 } },
    )
    expect(chips[0]![10]).toMatchObject({ outcome: 'refused', breaches: [] })
  })

  it('answers a token that nothing measures, and a system without pairs, as passing', () => {
    const bare = evaluate(system({ themes: light, tokens: [token('text', '#999999')] }))
    expect(nearestPassing(bare, 'text')).toMatchObject({ outcome: 'passing', evaluations: 0 })
    expect(repairPlan(bare)).toMatchObject({ edits: [], left: [], breachesBefore: 0 })
    const card = shadeCard(bare, { token: 'text', theme: 'light' }, { zoom: 'wide' })
    expect(card.chips.flat().every((chip) => chip === undefined || chip.outcome === 'whole')).toBe(
      true,
    )
    expect(measureDistinctSets(resolve(system({ themes: light })))).toEqual([])
  })

  it('answers a token on itself as what no colour can mend', () => {
    const model = system({
      themes: light,
      tokens: [token('text', '#999999')],
      pairs: [pair('text', 'text')],
    })
    const result = nearestPassing(evaluate(model), 'text')
    expect(result.outcome).toBe('none')
    expect(result.conflict!.requirements).toHaveLength(1)
    expect(result.conflict!.requirements[0]!.lightness).toEqual([])
  })

  it('answers a clear foreground as what no lightness can mend', () => {
    const model = system({
      themes: light,
      tokens: [token('text', '#00000000')],
      pairs: [pair('text', 'ground')],
    })
    const locked = new Set(['ground'])
    expect(nearestPassing(evaluate(model), 'text', { locked }).outcome).toBe('none')
    expect(repairPlan(evaluate(model), { locked }).left[0]).toMatchObject({ reason: 'conflict' })
  })
})
