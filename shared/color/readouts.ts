import {
  toLibraryHsl,
  toLibraryHwb,
  toLibraryLab,
  toLibraryLch,
  toLibraryLinearRgb,
  toLibraryOklab,
  toLibraryP3,
  toLibraryRgb,
  toLibraryXyz50,
  toLibraryXyz65,
} from './color-library.ts'
import { formatHex, formatOklch } from './format-color.ts'
import { relativeLuminance } from './luminance.ts'
import { LUMA_WEIGHTS, lumaOf, type LumaReading } from './luma.ts'
import { LINEAR_SRGB_TO_LMS } from './matrices.ts'
import type { Oklch } from './oklch.ts'
import { type RenderedColor, renderColor } from './render.ts'

/** Three numbers; `null` where a component has no meaning for the colour, or is more than a double holds. */
export type Reading = readonly [number | null, number | null, number | null]

const held = (component: number | undefined): number | null =>
  component !== undefined && Number.isFinite(component) ? component : null

const reading = (x?: number, y?: number, z?: number): Reading => [held(x), held(y), held(z)]

/** One colour in every space. Nothing is rounded. */
export interface Readouts {
  /** The stored colour: l 0 to 1, c, h in degrees. */
  readonly oklch: Reading
  readonly oklab: Reading
  /** Gamma-coded, of the stored colour; outside 0 to 1 where sRGB does not hold it. */
  readonly srgb: Reading
  /** Linear light, of the stored colour. */
  readonly linearSrgb: Reading
  /** Gamma-coded, of the stored colour. */
  readonly displayP3: Reading
  /** Y of white is 1. */
  readonly xyzD65: Reading
  readonly xyzD50: Reading
  /** White D50, as CSS has it; L 0 to 100. */
  readonly lab: Reading
  /** White D50; L 0 to 100, C, h in degrees. */
  readonly lch: Reading
  /** Cone responses long, medium, short, as OKLab defines them; 1 each for white. */
  readonly lms: Reading
  /** What follows is of the colour as it ships in sRGB. */
  readonly shipped: {
    readonly hex: string
    readonly gamut: RenderedColor['gamut']
    /** Hue in degrees, saturation and lightness 0 to 100. */
    readonly hsl: Reading
    /** Hue in degrees, saturation and value 0 to 100. */
    readonly hsv: Reading
    /** Hue in degrees, whiteness and blackness 0 to 100. */
    readonly hwb: Reading
    /** WCAG relative luminance Y, from linear light; 0 to 1. */
    readonly relativeLuminance: number
    /** Luma Y′, from gamma-coded channels, which is no luminance. */
    readonly lumaBt601: LumaReading
    readonly lumaBt709: LumaReading
    /** Cyan, magenta, yellow, black, 0 to 100. Uncalibrated: print goes through the printer's profile. */
    readonly uncalibratedCmyk: readonly [number, number, number, number]
  }
  /** CSS text of the stored colour. */
  readonly css: string
}

const ACHROMATIC = 1e-9

/** HSV from HSL of the same colour: both share the hue. */
function hsvOf(r: number, g: number, b: number, hue: number | null): Reading {
  const most = Math.max(r, g, b)
  const spread = most - Math.min(r, g, b)
  return [hue, most === 0 ? 0 : (spread / most) * 100, most * 100]
}

/** The complement of each channel, the common part as black. @see ISO 12647 leaves the rest to a profile */
function cmykOf(r: number, g: number, b: number): readonly [number, number, number, number] {
  const most = Math.max(r, g, b)
  if (most === 0) return [0, 0, 0, 100]
  const ink = (channel: number) => ((most - channel) / most) * 100
  return [ink(r), ink(g), ink(b), (1 - most) * 100]
}

function shippedOf(color: Oklch): Readouts['shipped'] {
  const rendered = renderColor(color)
  const [r, g, b] = [rendered.r / 255, rendered.g / 255, rendered.b / 255]
  const rgb = { mode: 'rgb', r, g, b } as const
  const hsl = toLibraryHsl(rgb)
  const hwb = toLibraryHwb(rgb)
  const hue = hsl.h ?? null
  return {
    hex: formatHex(rendered.r, rendered.g, rendered.b, rendered.a),
    gamut: rendered.gamut,
    hsl: [hue, hsl.s * 100, hsl.l * 100],
    hsv: hsvOf(r, g, b, hue),
    hwb: [hue, hwb.w * 100, hwb.b * 100],
    relativeLuminance: relativeLuminance(rendered.r, rendered.g, rendered.b),
    lumaBt601: lumaOf(r, g, b, LUMA_WEIGHTS.bt601),
    lumaBt709: lumaOf(r, g, b, LUMA_WEIGHTS.bt709),
    uncalibratedCmyk: cmykOf(r, g, b),
  }
}

function lmsOf(r: number, g: number, b: number): Reading {
  const m = LINEAR_SRGB_TO_LMS
  return reading(
    m[0] * r + m[1] * g + m[2] * b,
    m[3] * r + m[4] * g + m[5] * b,
    m[6] * r + m[7] * g + m[8] * b,
  )
}

/**
 * Reads one colour out in every space: as it is stored where a space holds every colour, as it ships where a space is
 * a way to write sRGB. Missing components count as 0; a hue without chroma is `null`.
 * @see https://www.w3.org/TR/css-color-4/ spaces and conversions
 */
export function readoutsOf(color: Oklch): Readouts {
  const source = { mode: 'oklch', l: color.l ?? 0, c: color.c ?? 0, h: color.h ?? 0 } as const
  const oklab = toLibraryOklab(source)
  const srgb = toLibraryRgb(source)
  const linear = toLibraryLinearRgb(source)
  const p3 = toLibraryP3(source)
  const xyz65 = toLibraryXyz65(source)
  const xyz50 = toLibraryXyz50(source)
  const lab = toLibraryLab(source)
  const lch = toLibraryLch(source)
  const isGrey = source.c <= ACHROMATIC
  return {
    oklch: [color.l, color.c, color.h],
    oklab: reading(oklab.l, oklab.a, oklab.b),
    srgb: reading(srgb.r, srgb.g, srgb.b),
    linearSrgb: reading(linear.r, linear.g, linear.b),
    displayP3: reading(p3.r, p3.g, p3.b),
    xyzD65: reading(xyz65.x, xyz65.y, xyz65.z),
    xyzD50: reading(xyz50.x, xyz50.y, xyz50.z),
    lab: reading(lab.l, lab.a, lab.b),
    lch: reading(lch.l, lch.c, isGrey ? undefined : lch.h),
    lms: lmsOf(linear.r, linear.g, linear.b),
    shipped: shippedOf(color),
    css: formatOklch(color),
  }
}
