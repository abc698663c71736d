import { describe, expect, it } from 'vitest'
import { readCssColor } from '#shared/color/css-color.ts'
import { writeLinear } from '#shared/color/rgb-gamut.ts'
import { formatOklch } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { encodedOf, linearOf } from '#shared/color/transfer.ts'
import { alphaOf, oklchOfText } from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

interface Conversion {
  readonly input: string
  readonly expected: {
    readonly space: string
    readonly coords: readonly (number | null)[]
    readonly alpha?: number
  }
  readonly tolerance: number
  readonly hueTolerance?: number
  readonly source: string
}
const { conversions, parsing, invalid } = readVectors<{
  readonly conversions: readonly Conversion[]
  readonly parsing: readonly { readonly input: string; readonly serialized: string }[]
  readonly invalid: readonly { readonly input: string }[]
}>('wpt-oklch')

/** Lab lightness 0 or 100 with a strong a and b: OKLCH lightness falls outside 0 to 1, which is refused on the way in. */
const REFUSED = conversions.filter(({ input }) =>
  ['lab(100 104.3 -50.9)', 'lch(0 20 180)'].includes(input),
)
/** Goes from P3 to sRGB without OKLCH; stored as OKLCH its chroma is powerless, so it is a grey 8e-6 away. */
const POWERLESS = conversions.filter(({ input }) => input.startsWith('color(display-p3 0.50000333'))
const isCompared = (row: Conversion) => !(REFUSED.includes(row) || POWERLESS.includes(row))

/** calc() is refused when a colour comes in: a token's value is a number, not an expression. */
const WITH_CALC = parsing.filter(({ input }) => input.includes('calc('))

function lightOf(color: Oklch, gamut: 'srgb' | 'p3'): number[] {
  const c = (color.c ?? 0) <= 0.000004 ? 0 : (color.c ?? 0)
  const h = ((color.h ?? 0) * Math.PI) / 180
  const light = new Float64Array(3)
  return [...writeLinear(color.l ?? 0, c * Math.cos(h), c * Math.sin(h), gamut, light)]
}

// Linear sRGB to XYZ D65 in decimals, as CSS Color 4 printed it before it turned to fractions.
function xyzOf(color: Oklch): number[] {
  const [r, g, b] = lightOf(color, 'srgb') as [number, number, number]
  return [
    0.41239079926595934 * r + 0.357584339383878 * g + 0.1804807884018343 * b,
    0.21263900587151027 * r + 0.715168678767756 * g + 0.07219231536073371 * b,
    0.01933081871559182 * r + 0.11919477979462598 * g + 0.9505321522496607 * b,
  ]
}

function coordsOf(color: Oklch, space: string): (number | null)[] {
  switch (space) {
    case 'srgb':
      return lightOf(color, 'srgb').map(encodedOf)
    case 'srgb-linear':
      return lightOf(color, 'srgb')
    case 'display-p3':
      return lightOf(color, 'p3').map(encodedOf)
    case 'display-p3-linear':
      return lightOf(color, 'p3')
    case 'xyz-d65':
      return xyzOf(color)
    case 'oklch':
      return [color.l, color.c, color.h]
    case 'srgb8': {
      const { r, g, b } = renderColor(color)
      return [r, g, b]
    }
    default:
      throw new Error(`No conversion to ${space} here.`)
  }
}

describe('CSS Color 4 conversions', () => {
  it.each(conversions.filter(isCompared))(
    'answers $input in $expected.space ($source)',
    ({ input, expected, tolerance, hueTolerance }) => {
      const coords = coordsOf(oklchOfText(input), expected.space)
      for (const [i, coord] of expected.coords.entries()) {
        const limit = i === 2 && expected.space === 'oklch' ? hueTolerance! : tolerance
        if (coord === null) expect(coords[i]).toBeNull()
        else expect(Math.abs(coords[i]! - coord)).toBeLessThanOrEqual(limit)
      }
      if (expected.alpha !== undefined) expect(alphaOf(input)).toBe(expected.alpha)
    },
  )

  it('refuses the two rows whose lightness lies outside 0 to 1', () => {
    expect(REFUSED).toHaveLength(2)
    for (const { input } of REFUSED) {
      expect(parseColor(input)).toEqual({
        ok: false,
        reason: expect.stringMatching(/lightness -?\d\.\d{4} lies outside 0 to 1/),
      })
    }
  })

  it.each(POWERLESS)('answers $input as a grey', ({ input, expected }) => {
    const color = oklchOfText(input)
    expect([color.c, color.h]).toEqual([0, null])
    for (const [i, coord] of coordsOf(color, expected.space).entries()) {
      expect(Math.abs(coord! - expected.coords[i]!)).toBeLessThan(1e-5)
    }
  })
})

describe('CSS Color 4 parsing', () => {
  it.each(parsing.filter((row) => row.serialized.startsWith('oklch(') && !WITH_CALC.includes(row)))(
    'answers $input as $serialized',
    ({ input, serialized }) => {
      const color = oklchOfText(input)
      const rounded = (component: number | null) =>
        component === null ? null : Number(component.toFixed(4))
      expect(
        formatOklch({
          l: rounded(color.l),
          c: rounded(color.c),
          h: rounded(color.h),
          alpha: rounded(color.alpha),
        }),
      ).toBe(serialized)
    },
  )

  it.each(parsing.filter((row) => !row.serialized.startsWith('oklch(')))(
    'answers $input as $serialized',
    ({ input, serialized }) => {
      const color = readCssColor(input)
      const expected = readCssColor(serialized)
      if (!(color.ok && expected.ok)) throw new Error('Both sides have to be colors.')
      const first = oklchOfText(input)
      const second = oklchOfText(serialized)
      expect(first.l).toBeCloseTo(second.l!, 6)
      expect(first.c).toBeCloseTo(second.c!, 6)
      expect(first.h).toBeCloseTo(second.h!, 4)
      // Legacy alpha is written with two places.
      expect(Math.abs(color.value.alpha! - expected.value.alpha!)).toBeLessThan(0.005)
      if (color.value.space === expected.value.space) {
        expect(color.value.components.map((part) => Number(part!.toFixed(6)))).toEqual(
          expected.value.components,
        )
      }
    },
  )

  it.each(WITH_CALC)('refuses $input', ({ input }) => {
    expect(parseColor(input)).toEqual({
      ok: false,
      reason: 'calc() is not accepted: write the number itself.',
    })
  })

  it.each(invalid)('refuses $input', ({ input }) => {
    const reading = parseColor(input)
    expect(reading.ok).toBe(false)
    if (!reading.ok) expect(reading.reason).toMatch(/^[^\n]+\.$/)
  })

  it('leaves the linear and coded forms of a component inverse to each other', () => {
    for (const value of [-1.2, -0.04, -0.001, 0, 0.0031308, 0.04045, 0.5, 1, 1.6]) {
      expect(linearOf(encodedOf(value))).toBeCloseTo(value, 12)
    }
  })
})
