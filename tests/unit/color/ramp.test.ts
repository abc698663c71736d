import { describe, expect, it } from 'vitest'
import { maxChroma } from '#shared/color/max-chroma.ts'
import { isInGamut } from '#shared/color/gamut-map.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { type RampStep, rampByLightness, rampByRatio } from '#shared/color/ramp.ts'

function colorOf(css: string) {
  const reading = parseColor(css)
  if (!reading.ok) throw new TypeError(reading.reason)
  return reading.color
}
const hexOf = ({ rendered: { r, g, b } }: RampStep) => formatHex(r, g, b)

describe('ramps', () => {
  it('answers the lightest greys on white that have 3, 4.5 and 7', () => {
    const from = { seed: colorOf('#808080'), ground: colorOf('#ffffff') }
    const steps = rampByRatio(from, [3, 4.5, 7])
    // w3c/wcag understanding/21/non-text-contrast.html: #767676; #949494 and #595959 by the same formula.
    expect(steps.map(hexOf)).toEqual(['#949494', '#767676', '#595959'])
    for (const { ratio, wanted } of steps) expect(ratio).toBeGreaterThanOrEqual(wanted!)
  })

  it('answers lighter steps on a dark ground, hue kept and chroma within sRGB', () => {
    const from = { seed: colorOf('oklch(0.6 0.2 30)'), ground: colorOf('#101820') }
    const steps = rampByRatio(from, [1.5, 4.5, 15])
    expect(steps.map(({ color }) => color.h)).toEqual([30, 30, 30])
    expect(steps[0]!.color.l).toBeLessThan(steps[2]!.color.l!)
    for (const { color, rendered, ratio, wanted } of steps) {
      expect(rendered.gamut).toBe('srgb')
      expect(color.c).toBeLessThanOrEqual(0.2)
      expect(ratio).toBeGreaterThanOrEqual(wanted!)
      expect(ratio).toBeLessThan(wanted! * 1.03)
    }
  })

  it('answers the furthest there is where a ratio is out of reach, and says so', () => {
    const from = { seed: colorOf('#336699'), ground: colorOf('#777777') }
    const [step] = rampByRatio(from, [12])
    expect(step).toMatchObject({ wanted: 12, isShort: true })
    expect(step!.ratio).toBeLessThan(5)
  })

  it('answers even steps of lightness with both ends', () => {
    const from = { seed: colorOf('oklch(0.6 0.05 200)'), ground: colorOf('#ffffff') }
    const steps = rampByLightness(from, { steps: 5, from: 0.2, to: 1 })
    expect(steps.map(({ color }) => color.l!.toFixed(2))).toEqual([
      '0.20',
      '0.40',
      '0.60',
      '0.80',
      '1.00',
    ])
    expect(steps[4]!.color.c).toBe(0)
    expect(steps.every(({ wanted }) => wanted === undefined)).toBe(true)
  })

  it.each([[0.9], [21.1], [Number.NaN], [Number.POSITIVE_INFINITY]])(
    'refuses a ratio of %s',
    (ratio) => {
      const white = colorOf('#fff')
      expect(() => rampByRatio({ seed: white, ground: white }, [ratio])).toThrow(TypeError)
    },
  )

  it.each([
    { steps: 1, from: 0, to: 1 },
    { steps: 2.5, from: 0, to: 1 },
    { steps: 3, from: -0.1, to: 1 },
    { steps: 3, from: 0, to: Number.NaN },
  ])('refuses a scale of $steps from $from to $to', (scale) => {
    const white = colorOf('#fff')
    expect(() => rampByLightness({ seed: white, ground: white }, scale)).toThrow(TypeError)
  })

  it('answers an empty ramp for no ratios', () => {
    const white = colorOf('#fff')
    expect(rampByRatio({ seed: white, ground: white }, [])).toEqual([])
  })
})

describe('largest chroma', () => {
  it.each(['srgb', 'p3'] as const)(
    'answers the edge of %s: in gamut there, out of it just beyond',
    (gamut) => {
      for (let hue = 0; hue < 360; hue += 15) {
        for (const l of [0.1, 0.35, 0.6, 0.85]) {
          const most = maxChroma(l, hue, gamut)
          expect(isInGamut(l, most, hue, gamut)).toBe(true)
          expect(isInGamut(l, most + 1e-4, hue, gamut)).toBe(false)
        }
      }
    },
  )

  it('answers the chroma of red and green at their own lightness and hue', () => {
    for (const hex of ['#ff0000', '#00ff00']) {
      const { l, c, h } = colorOf(hex)
      expect(maxChroma(l!, h!, 'srgb')).toBeCloseTo(c!, 4)
      expect(maxChroma(l!, h!, 'p3')).toBeGreaterThan(c!)
    }
  })

  it('answers up to where every chroma is held: short of blue, before which the edge dips', () => {
    const { l, c, h } = colorOf('#0000ff')
    const most = maxChroma(l!, h!, 'srgb')
    expect(most).toBeLessThan(c!)
    for (let part = 0; part <= 1; part += 0.01) {
      expect(isInGamut(l!, part * most, h!, 'srgb')).toBe(true)
    }
  })

  it('answers none for black, white and what lies beyond', () => {
    for (const l of [0, 1, -0.1, 1.2, Number.NaN]) expect(maxChroma(l, 30, 'p3')).toBe(0)
  })
})
