import Color from 'colorjs.io'
import { describe, expect, it } from 'vitest'
import { relativeLuminance } from '#shared/color/luminance.ts'
import { LUMA_WEIGHTS, lumaOf } from '#shared/color/luma.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { type Reading, readoutsOf } from '#shared/color/readouts.ts'
import { encodedOf } from '#shared/color/transfer.ts'

function colorOf(css: string): Oklch {
  const reading = parseColor(css)
  if (!reading.ok) throw new TypeError(reading.reason)
  return reading.color
}

const SAMPLES = ['#ff8040', '#102a43', '#7f7f7f', 'oklch(0.7 0.3 150)', 'color(display-p3 0 1 0)']

function near(got: Reading, wanted: readonly (number | null)[], within: number): void {
  for (const [at, one] of wanted.entries()) {
    if (one === null || got[at] === null) continue
    expect(Math.abs(got[at]! - Number(one))).toBeLessThan(within)
  }
}

describe('readouts', () => {
  // Oracle: colorjs.io 0.7.1, an implementation apart from ours.
  it.each(SAMPLES)('answers %s in every space as the reference library does', (css) => {
    const color = colorOf(css)
    const readouts = readoutsOf(color)
    const reference = new Color('oklch', [color.l ?? 0, color.c ?? 0, color.h ?? 0])
    const coords = (space: string) => reference.to(space).coords
    near(readouts.oklab, coords('oklab'), 1e-6)
    near(readouts.srgb, coords('srgb'), 1e-5)
    near(readouts.linearSrgb, coords('srgb-linear'), 1e-5)
    near(readouts.displayP3, coords('p3'), 1e-5)
    near(readouts.xyzD65, coords('xyz-d65'), 1e-5)
    near(readouts.xyzD50, coords('xyz-d50'), 1e-5)
    near(readouts.lab, coords('lab'), 1e-3)
    const shipped = new Color(readouts.shipped.hex)
    near(readouts.shipped.hsl, shipped.to('hsl').coords, 1e-4)
    near(readouts.shipped.hsv, shipped.to('hsv').coords, 1e-4)
    near(readouts.shipped.hwb, shipped.to('hwb').coords, 1e-4)
  })

  it('answers white as one in every cone and as the white of XYZ D65 and D50', () => {
    const { lms, xyzD65, xyzD50, lab } = readoutsOf(colorOf('#ffffff'))
    near(lms, [1, 1, 1], 1e-6)
    // CSS Color 4, sample code for color conversions: D65 and D50 from the chromaticities of CIE 15.
    near(xyzD65, [0.95045, 1, 1.08905], 1e-4)
    near(xyzD50, [0.9643, 1, 0.8251], 1e-4)
    near(lab, [100, 0, 0], 1e-4)
  })

  it('answers luma and luminance apart: they differ for saturated colours and agree at the ends', () => {
    // Common practice, no source: luma weighs gamma-coded channels, luminance linear light.
    const red = readoutsOf(colorOf('#ff0000')).shipped
    expect(red.relativeLuminance).toBeCloseTo(0.2126, 4)
    expect(red.lumaBt709.luma).toBeCloseTo(0.2126, 4)
    expect(red.lumaBt601.luma).toBeCloseTo(0.299, 4)
    const olive = readoutsOf(colorOf('#806000')).shipped
    expect(olive.lumaBt709.luma - olive.relativeLuminance).toBeGreaterThan(0.2)
    const { relativeLuminance: white, lumaBt601 } = readoutsOf(colorOf('#ffffff')).shipped
    expect(white).toBeCloseTo(1, 12)
    near([lumaBt601.luma, lumaBt601.pb, lumaBt601.pr], [1, 0, 0], 1e-12)
  })

  it('answers the colour differences of the primaries at their ends', () => {
    // ITU-R BT.601-7, 2.5.2: the differences of blue and red are scaled to ±0.5.
    expect(lumaOf(0, 0, 1, LUMA_WEIGHTS.bt601).pb).toBeCloseTo(0.5, 12)
    expect(lumaOf(1, 0, 0, LUMA_WEIGHTS.bt601).pr).toBeCloseTo(0.5, 12)
    expect(lumaOf(1, 1, 0, LUMA_WEIGHTS.bt709).pb).toBeCloseTo(-0.5, 12)
    expect(lumaOf(0, 1, 1, LUMA_WEIGHTS.bt709).pr).toBeCloseTo(-0.5, 12)
  })

  it('answers half red and half blue as darker to the eye than half blue and half green', () => {
    // Common practice, no source: equal linear intensities, green weighs most.
    const half = encodedOf(0.5) * 255
    const byte = Math.round(half)
    expect(relativeLuminance(byte, 0, byte)).toBeLessThan(relativeLuminance(0, byte, byte) / 2)
  })

  it('answers hue 0 as red, and pink as red less saturated, in HSV', () => {
    // Common practice, no source.
    expect(readoutsOf(colorOf('#ff0000')).shipped.hsv).toEqual([0, 100, 100])
    const [hue, saturation, value] = readoutsOf(colorOf('#ff8080')).shipped.hsv
    expect([hue, value]).toEqual([0, 100])
    expect(saturation).toBeCloseTo(49.8, 1)
  })

  it('answers an uncalibrated CMYK by its name, black as black ink alone', () => {
    expect(readoutsOf(colorOf('#000000')).shipped.uncalibratedCmyk).toEqual([0, 0, 0, 100])
    expect(readoutsOf(colorOf('#00ffff')).shipped.uncalibratedCmyk).toEqual([100, 0, 0, 0])
    const [c, m, y, k] = readoutsOf(colorOf('#336699')).shipped.uncalibratedCmyk
    expect([c, m, y, k].map((ink) => Math.round(ink))).toEqual([67, 33, 0, 40])
  })

  it('leaves a hue missing where there is no chroma, and what is stored as it is', () => {
    const { oklch, lch, shipped, css } = readoutsOf({ l: 0.5, c: 0, h: null, alpha: 1 })
    expect([oklch[2], lch[2], shipped.hsl[0], shipped.hwb[0]]).toEqual([null, null, null, null])
    expect(css).toBe('oklch(0.5 0 none)')
  })

  it('leaves out what no number holds, of a chroma that CSS bounds nowhere', () => {
    // CSS Color 4, 9.4: chroma is "theoretically unbounded".
    for (const text of ['oklch(0.5 1e308 20)', 'oklch(0.5 1e100 20)', 'oklch(1 1e308 296)']) {
      const { shipped, css: _, ...spaces } = readoutsOf(colorOf(text))
      for (const part of Object.values(spaces).flat()) {
        expect(part === null || Number.isFinite(part)).toBe(true)
      }
      expect(spaces.lch[1]).toBeNull()
      expect(shipped.gamut).toBe('beyond')
    }
  })
})
