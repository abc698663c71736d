import { describe, expect, it } from 'vitest'
import type { StateRule, StateRules, TokenModel } from '#shared/checks/model.ts'
import { mappedChroma } from '#shared/color/gamut-map.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { pair, system, token, value } from './model-builder.ts'
import { evaluate, findings, hexAt, lightnessAt, read, truncated } from './reading.ts'

const ALL = ['hover', 'active', 'focus', 'disabled'] as const

function away(reference: string): StateRule['towards'] {
  const role = reference === 'ground' || reference === 'ink'
  return { direction: 'away', reference: role ? reference : { token: reference } }
}

function towards(reference: string): StateRule['towards'] {
  return { ...away(reference)!, direction: 'towards' }
}

function fill(text: string, states: StateRules = {}, more: Partial<TokenModel> = {}): TokenModel {
  return token('fill', text, { states: ALL, rules: { states }, ...more })
}

describe('the example of the engine specification: oklch(0.52 0.17 258) in a dark theme under white', () => {
  const label = token('label', '#ffffff')
  const ratiosOf = (states: StateRules) => {
    const model = system({
      tokens: [label, fill('oklch(0.52 0.17 258)', states)],
      pairs: [pair('label', 'fill', { relation: 'inside', states: ['hover', 'active'] })],
    })
    return findings(model)
      .filter(({ theme }) => theme === 'dark')
      .map(({ ratio }) => truncated(ratio))
  }

  it('answers 5.60, 7.02 and 8.62 away from its label', () => {
    const states = { hover: { towards: away('label') }, active: { towards: away('label') } }
    expect(ratiosOf(states)).toEqual([5.6, 7.02, 8.62])
  })

  it('answers 5.60, 4.55 and 3.69 away from the ground, which is the default', () => {
    expect(ratiosOf({})).toEqual([5.6, 4.55, 3.69])
  })
})

describe('defaults', () => {
  const model = system({ tokens: [fill('oklch(0.6 0.1 258)')] })

  it('answers hover 0.05 and active 0.10 away from the ground, which in light is darker', () => {
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.55, 12)
    expect(lightnessAt(model, 'fill active')).toBeCloseTo(0.5, 12)
    expect(lightnessAt(model, 'fill dark hover')).toBeCloseTo(0.65, 12)
  })

  it('answers focus as rest', () => {
    expect(read(model, 'fill focus').oklch).toEqual(read(model, 'fill').oklch)
  })

  it('answers disabled with chroma × 0.35 and alpha × 0.45', () => {
    const { oklch } = read(model, 'fill disabled')
    expect(oklch.l).toBe(0.6)
    expect(oklch.c).toBeCloseTo(0.035, 12)
    expect(oklch.alpha).toBeCloseTo(0.45, 12)
  })

  it('leaves the other fields of a default where a rule gives only one', () => {
    const partial = system({ tokens: [fill('oklch(0.6 0.1 258)', { disabled: { alpha: 0.5 } })] })
    expect(read(partial, 'fill disabled').oklch.c).toBeCloseTo(0.035, 12)
    expect(read(partial, 'fill disabled').oklch.alpha).toBeCloseTo(0.5, 12)
  })
})

describe('arithmetic', () => {
  it('answers factors on chroma and alpha, and hue turned past 360', () => {
    const states = { hover: { lightness: 0, chroma: 1.5, hue: 30 } }
    const { oklch } = read(system({ tokens: [fill('oklch(0.6 0.1 350)', states)] }), 'fill hover')
    expect(oklch.c).toBeCloseTo(0.15, 12)
    expect(oklch.h).toBeCloseTo(20, 10)
  })

  it('leaves a missing hue missing', () => {
    const model = system({ tokens: [fill('oklch(0.6 0.1 none)', { hover: { hue: 30 } })] })
    expect(read(model, 'fill hover').oklch.h).toBeNull()
  })

  it('answers from the stored colour, not the one mapped into sRGB', () => {
    const model = system({ tokens: [fill('oklch(0.6 0.35 150)', { hover: { lightness: 0.02 } })] })
    expect(read(model, 'fill hover').oklch.c).toBe(0.35)
    expect(mappedChroma(0.6, 0.35, 150)).toBeLessThan(0.3)
  })
})

describe('direction', () => {
  const hoverAlone = { states: ['hover' as const] }

  it('answers lighter where rest is lighter than what it steps away from', () => {
    const states = { hover: { towards: away('under') } }
    const model = system({
      tokens: [token('under', '#333'), fill('oklch(0.6 0 0)', states, hoverAlone)],
    })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.65, 12)
  })

  it('answers towards as the opposite of away', () => {
    const states = { hover: { towards: towards('under') } }
    const model = system({
      tokens: [token('under', '#333'), fill('oklch(0.6 0 0)', states, hoverAlone)],
    })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.55, 12)
  })

  it('leaves rest nearer than 0.02 to its reference to go towards ink', () => {
    const near = (l: number) => system({ tokens: [fill(`oklch(${l} 0 0)`)] })
    expect(lightnessAt(near(0.9899), 'fill hover')).toBeCloseTo(0.9399, 12)
    // At 0.02 above the ground it has a side of its own: lighter has no room, so it turns.
    expect(read(near(0.9901), 'fill hover').provenance).toMatchObject({
      step: { side: 'opposite' },
    })
    expect(read(near(0.9899), 'fill hover').provenance).toMatchObject({
      step: { side: 'preferred' },
    })
  })

  it('answers lighter for ink itself beside its reference', () => {
    const ink = token('ink', 'oklch(0.25 0.02 250)', {
      states: ['hover'],
      values: { dark: { rest: value('oklch(0.94 0 0)') } },
      rules: { states: { hover: { towards: away('ink') } } },
    })
    const base = system()
    const model = { ...base, tokens: [base.tokens[0]!, ink] }
    expect(lightnessAt(model, 'ink hover')).toBeCloseTo(0.3, 12)
  })

  it('answers with rest colours of the same theme', () => {
    const states = { hover: { towards: away('under') } }
    const under = token('under', '#fff', { values: { dark: { rest: value('#000') } } })
    const model = system({ tokens: [under, fill('oklch(0.6 0 0)', states, hoverAlone)] })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.55, 12)
    expect(lightnessAt(model, 'fill dark hover')).toBeCloseTo(0.65, 12)
  })
})

it('answers alike wherever in the ledger the reference stands', () => {
  const states = { hover: { towards: away('last') } }
  const first = fill('oklch(0.6 0 0)', states, { states: ['hover'] })
  const model = system({ tokens: [first, token('last', '#fff')] })
  expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.55, 12)
})

describe('one direction for all states of a token', () => {
  it('answers with the reference of the largest step for the smaller steps too', () => {
    const states = {
      hover: { lightness: 0.04, towards: towards('ground') },
      active: { lightness: 0.2, towards: away('ground') },
    }
    const model = system({ tokens: [fill('oklch(0.6 0 0)', states)] })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.56, 12)
    expect(lightnessAt(model, 'fill active')).toBeCloseTo(0.4, 12)
  })

  it('answers by the first of hover, active, focus and disabled where steps tie', () => {
    const states = {
      hover: { lightness: 0.1, towards: towards('ground') },
      active: { lightness: 0.1, towards: away('ground') },
    }
    const model = system({ tokens: [fill('oklch(0.6 0 0)', states)] })
    expect(lightnessAt(model, 'fill active')).toBeCloseTo(0.7, 12)
  })

  it('answers by the largest step of a listed state even where that state is overridden', () => {
    const states = {
      hover: { lightness: 0.04, towards: towards('ground') },
      active: { lightness: 0.2, towards: away('ground') },
    }
    const more = { values: { light: { active: value('#00ff00') } } }
    const model = system({ tokens: [fill('oklch(0.6 0 0)', states, more)] })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.56, 12)
    expect(hexAt(model, 'fill active')).toBe('#00ff00')
  })

  it('leaves out the step of a state that is not listed', () => {
    const states = {
      hover: { lightness: 0.04, towards: towards('ground') },
      active: { lightness: 0.2, towards: away('ground') },
    }
    const model = system({ tokens: [fill('oklch(0.6 0 0)', states, { states: ['hover'] })] })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.64, 12)
  })
})

describe('room', () => {
  it('answers the preferred side where the largest step just fits', () => {
    const model = system({ tokens: [fill('oklch(0.1 0 0)')] })
    expect(read(model, 'fill active').oklch.l).toBe(0)
    expect(read(model, 'fill hover').provenance).toMatchObject({ step: { side: 'preferred' } })
  })

  it('answers the opposite side for all states where the largest step does not fit', () => {
    const model = system({ tokens: [fill('oklch(0.09 0 0)')] })
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.14, 12)
    expect(lightnessAt(model, 'fill active')).toBeCloseTo(0.19, 12)
    expect(read(model, 'fill active').provenance).toMatchObject({
      step: { side: 'opposite', moved: 'lighter' },
    })
  })

  it('answers the roomier side, clamped, where neither fits', () => {
    const states = { active: { lightness: 0.7 } }
    const model = system({ tokens: [fill('oklch(0.4 0 0)', states)] })
    expect(read(model, 'fill active').oklch.l).toBe(1)
    expect(lightnessAt(model, 'fill hover')).toBeCloseTo(0.45, 12)
    expect(read(model, 'fill active').provenance).toMatchObject({
      step: { side: 'roomier', clamped: true },
    })
  })

  it('answers the preferred side where neither fits and both have the same room', () => {
    const model = system({ tokens: [fill('oklch(0.5 0 0)', { active: { lightness: 0.7 } })] })
    expect(read(model, 'fill active').oklch.l).toBe(0)
  })

  it('answers the opposite side where a step would lose more than half of the mapped chroma', () => {
    // A red and a green in a dark theme: lighter, one keeps a third of its chroma, the other 0.57 of it.
    const kept = (l: number, c: number, h: number, step: number) =>
      mappedChroma(l + step, c, h) / mappedChroma(l, c, h)
    expect(kept(0.7, 0.17, 30, 0.2)).toBeLessThan(0.4)
    expect(kept(0.85, 0.2, 130, 0.12)).toBeGreaterThan(0.55)
    const hover = (text: string, lightness: number) => {
      const more = { states: ['hover' as const] }
      const model = system({ tokens: [fill(text, { hover: { lightness } }, more)] })
      return read(model, 'fill dark hover')
    }
    expect(hover('oklch(0.7 0.17 30)', 0.2)).toMatchObject({
      provenance: { step: { side: 'opposite' } },
    })
    expect(hover('oklch(0.7 0.17 30)', 0.2).oklch.l).toBeCloseTo(0.5, 12)
    expect(hover('oklch(0.85 0.2 130)', 0.12)).toMatchObject({
      provenance: { step: { side: 'preferred' } },
    })
  })

  it('leaves chroma untested where rest has less than 0.02 of it', () => {
    const states = { hover: { lightness: 0.24 } }
    const more = { states: ['hover' as const] }
    const model = system({ tokens: [fill('oklch(0.75 0.019 20)', states, more)] })
    const kept = mappedChroma(0.99, 0.019, 20) / mappedChroma(0.75, 0.019, 20)
    expect(kept).toBeLessThan(0.5)
    expect(lightnessAt(model, 'fill dark hover')).toBeCloseTo(0.99, 12)
  })
})

describe('translucent rest', () => {
  const model = system({ tokens: [fill('oklch(0.6 0.1 258 / 0.5)')] })

  it('answers alpha + 0.05 for hover and + 0.10 for active instead of a lightness step', () => {
    expect(read(model, 'fill hover').oklch).toMatchObject({ l: 0.6, alpha: 0.55 })
    expect(read(model, 'fill active').oklch).toMatchObject({ l: 0.6, alpha: 0.6 })
  })

  it('answers the factor before the step, clamped', () => {
    const more = system({
      tokens: [
        fill('oklch(0.6 0.1 258 / 0.5)', { hover: { alpha: 0.5 } }),
        token('high', 'oklch(0.6 0.1 258 / 0.98)', { states: ['hover'] }),
      ],
    })
    expect(read(more, 'fill hover').oklch.alpha).toBeCloseTo(0.3, 12)
    expect(read(more, 'high hover').oklch.alpha).toBe(1)
  })

  it('leaves a rule without a lightness step to its factors', () => {
    const still = system({
      tokens: [fill('oklch(0.6 0.1 258 / 0.5)', { hover: { lightness: 0 } })],
    })
    expect(read(still, 'fill hover').oklch.alpha).toBe(0.5)
    expect(read(model, 'fill disabled').oklch.alpha).toBeCloseTo(0.225, 12)
  })
})

describe('evaluation of the example', () => {
  it('answers ratios that a hand computation of the rendered bytes gives', () => {
    const model = system({ tokens: [token('label', '#fff'), fill('oklch(0.52 0.17 258)')] })
    const { rendered } = read(model, 'fill')
    const hand = contrastRatio(1, relativeLuminance(rendered.r, rendered.g, rendered.b))
    const withPair = { ...model, pairs: [pair('label', 'fill', { states: [] })] }
    expect(evaluate(withPair).measures[0]!.ratio[0]).toBe(hand)
  })
})
