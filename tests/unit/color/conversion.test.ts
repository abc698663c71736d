import Color from 'colorjs.io'
import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { deltaE2000, deltaEOk, labOfBytes } from '#shared/color/difference.ts'
import { formatHex, formatOklch } from '#shared/color/format-color.ts'
import { LINEAR_REC2020_TO_XYZ, type Matrix3, productOf } from '#shared/color/matrices.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { writeLinear, writeOklab } from '#shared/color/rgb-gamut.ts'
import { COLOR_SPACES, type ColorSpace, oklchOf } from '#shared/color/to-oklch.ts'
import { byteOf } from '#shared/color/transfer.ts'

const SAMPLES: { readonly [space in ColorSpace]: readonly [number, number, number] } = {
  srgb: [0.2, 0.4, 0.8],
  'srgb-linear': [0.033, 0.133, 0.604],
  'display-p3': [0.25, 0.4, 0.77],
  'display-p3-linear': [0.05, 0.13, 0.55],
  'a98-rgb': [0.29, 0.4, 0.78],
  'prophoto-rgb': [0.33, 0.34, 0.71],
  rec2020: [0.27, 0.36, 0.74],
  'xyz-d65': [0.17, 0.146, 0.59],
  'xyz-d50': [0.155, 0.141, 0.444],
  hsl: [220, 60, 50],
  hwb: [220, 20, 20],
  lab: [44.4, 14.9, -57.4],
  lch: [44.4, 59.3, 284.6],
  oklab: [0.53, -0.02, -0.155],
  oklch: [0.53, 0.156, 262],
}
// The names that colorjs.io, the oracle here, gives some spaces.
const REFERENCE_NAMES: { readonly [space in ColorSpace]?: string } = {
  'display-p3': 'p3',
  'display-p3-linear': 'p3-linear',
  'a98-rgb': 'a98rgb',
  'prophoto-rgb': 'prophoto',
}

describe('oklchOf', () => {
  it.each(COLOR_SPACES)('answers %s as the reference library does', (space) => {
    const components = SAMPLES[space]
    const reading = oklchOf({ space, components, alpha: 1 })
    if (!reading.ok) throw new Error(reading.reason)
    const [l, c, h] = new Color(REFERENCE_NAMES[space] ?? space, [...components]).to('oklch').coords
    expect(reading.color.l).toBeCloseTo(l!, 7)
    expect(reading.color.c).toBeCloseTo(c!, 7)
    expect(reading.color.h).toBeCloseTo(h!, 4)
  })

  it('refuses what is not finite', () => {
    for (const bad of [Number.NaN, Infinity, -Infinity]) {
      expect(oklchOf({ space: 'oklch', components: [0.5, bad, 0], alpha: 1 }).ok).toBe(false)
      expect(oklchOf({ space: 'lab', components: [50, bad, 0], alpha: 1 }).ok).toBe(false)
    }
    expect(oklchOf({ space: 'oklab', components: [0.5, 1e300, 1e300], alpha: 1 }).ok).toBe(false)
  })

  it('refuses a lightness outside 0 to 1 and clamps what is only an error of conversion', () => {
    for (const l of [1.1, 1.00002, -0.00002]) {
      expect(oklchOf({ space: 'oklch', components: [l, 0, 0], alpha: 1 }).ok).toBe(false)
    }
    expect(oklchOf({ space: 'srgb', components: [1, 1, 1], alpha: 1 })).toMatchObject({
      color: { l: 1, c: 0, h: null },
    })
  })
})

describe('the Rec. 2020 matrix', () => {
  // ITU-R BT.2020: R .708 .292, G .170 .797, B .131 .046, white D65 at x .3127, y .3290.
  it('answers the primaries and the white of BT.2020', () => {
    const m = LINEAR_REC2020_TO_XYZ
    const primaries = [
      [0.708, 0.292],
      [0.17, 0.797],
      [0.131, 0.046],
    ] as const
    for (const [i, [x, y]] of primaries.entries()) {
      const [big, mid, small] = [m[i]!, m[i + 3]!, m[i + 6]!]
      expect(big / (big + mid + small)).toBeCloseTo(x, 12)
      expect(mid / (big + mid + small)).toBeCloseTo(y, 12)
    }
    const white = [m[0] + m[1] + m[2], m[3] + m[4] + m[5], m[6] + m[7] + m[8]] as const
    expect(white[1]).toBeCloseTo(1, 12)
    expect(white[0]).toBeCloseTo(0.3127 / 0.329, 12)
    expect(white[2]).toBeCloseTo((1 - 0.3127 - 0.329) / 0.329, 12)
  })

  it('answers a product row by column', () => {
    const twice: Matrix3 = [2, 0, 0, 0, 2, 0, 0, 0, 2]
    const count: Matrix3 = [1, 2, 3, 4, 5, 6, 7, 8, 9]
    expect(productOf(twice, count)).toEqual([2, 4, 6, 8, 10, 12, 14, 16, 18])
    expect(productOf(count, count)).toEqual([30, 36, 42, 66, 81, 96, 102, 126, 150])
  })
})

describe('the fast path', () => {
  // Our own arithmetic stands beside the library's: it has to give the same bytes.
  it('answers the bytes that the library gives, in sRGB and P3', () => {
    const unit = fc.double({ min: 0, max: 1, noNaN: true })
    void fc.assert(
      fc.property(unit, unit, unit, (r, g, b) => {
        const reading = oklchOf({ space: 'srgb', components: [r, g, b], alpha: 1 })
        if (!reading.ok) throw new Error(reading.reason)
        const { r: red, g: green, b: blue } = renderColor(reading.color)
        const reference = new Color('srgb', [r, g, b]).to('oklch').to('srgb').coords
        expect([red, green, blue]).toEqual(reference.map((coord) => byteOf(coord!)))
      }),
      { numRuns: 500 },
    )
  })

  it.each(['srgb', 'p3'] as const)('answers %s from OKLab and back', (gamut) => {
    const unit = fc.double({ min: 0, max: 1, noNaN: true })
    void fc.assert(
      fc.property(unit, unit, unit, (r, g, b) => {
        const [l, a, y] = writeOklab(r, g, b, gamut, new Float64Array(3))
        const back = writeLinear(l!, a!, y!, gamut, new Float64Array(3))
        for (const [i, channel] of [r, g, b].entries()) expect(back[i]).toBeCloseTo(channel, 9)
      }),
    )
  })
})

describe('formatting', () => {
  it('answers oklch() with none, and without an alpha of 1', () => {
    expect(formatOklch({ l: 0.62, c: 0.12, h: 240, alpha: 1 })).toBe('oklch(0.62 0.12 240)')
    expect(formatOklch({ l: null, c: 0, h: null, alpha: 0.5 })).toBe('oklch(none 0 none / 0.5)')
    expect(formatOklch({ l: 1, c: 0, h: null, alpha: null })).toBe('oklch(1 0 none / none)')
  })

  it('answers hex with six digits, or eight where translucent', () => {
    expect(formatHex(51, 102, 204)).toBe('#3366cc')
    expect(formatHex(0, 10, 255, 128)).toBe('#000aff80')
  })
})

describe('difference', () => {
  it('answers the distance in OKLab, alpha and missing hues left out', () => {
    const white = { l: 1, c: 0, h: null, alpha: 1 }
    expect(deltaEOk(white, { l: 0, c: 0, h: null, alpha: 0 })).toBe(1)
    expect(
      deltaEOk({ l: 0.5, c: 0.1, h: 0, alpha: 1 }, { l: 0.5, c: 0.1, h: 180, alpha: 1 }),
    ).toBeCloseTo(0.2, 12)
  })

  it('answers Lab with white D65: white is 100 0 0', () => {
    const white = labOfBytes(255, 255, 255)
    expect(white.l).toBeCloseTo(100, 4)
    expect(white.a).toBeCloseTo(0, 2)
    expect(white.b).toBeCloseTo(0, 2)
    const [l, a, b] = new Color('#3366cc').to('lab-d65').coords
    const ours = labOfBytes(51, 102, 204)
    expect(ours.l).toBeCloseTo(l!, 3)
    expect(ours.a).toBeCloseTo(a!, 3)
    expect(ours.b).toBeCloseTo(b!, 3)
    expect(deltaE2000(ours, ours)).toBe(0)
    expect(parseColor('#3366cc').ok).toBe(true)
  })
})
