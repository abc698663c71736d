import { differenceCiede2000 } from 'culori/fn'
import { toLibraryLab65 } from './color-library.ts'
import { cieLightness } from './luminance.ts'
import type { Oklch } from './oklch.ts'

/** CIE Lab with white D65. */
export interface LabD65 {
  readonly l: number
  readonly a: number
  readonly b: number
}

const ciede2000 = differenceCiede2000()

/**
 * Measures ΔE OK, the straight distance in OKLab; 0.02 is about one just noticeable difference. Alpha is left out.
 * @returns 0 or more, unrounded.
 * @see https://www.w3.org/TR/css-color-4/#color-difference-OK
 */
export function deltaEOk(first: Oklch, second: Oklch): number {
  const p = (Math.PI / 180) * (first.h ?? 0)
  const q = (Math.PI / 180) * (second.h ?? 0)
  const c1 = first.c ?? 0
  const c2 = second.c ?? 0
  return Math.hypot(
    (first.l ?? 0) - (second.l ?? 0),
    c1 * Math.cos(p) - c2 * Math.cos(q),
    c1 * Math.sin(p) - c2 * Math.sin(q),
  )
}

/**
 * Measures CIEDE2000 with unit weights.
 * @returns 0 or more, unrounded.
 * @see https://doi.org/10.1002/col.20070 Sharma, Wu, Dalal 2005
 */
export function deltaE2000(first: LabD65, second: LabD65): number {
  return ciede2000({ mode: 'lab65', ...first }, { mode: 'lab65', ...second })
}

/** CIEDE2000 divides a difference of L* by at most this: S_L where the mean is black or white. */
const MOST_LIGHTNESS_WEIGHT = 1 + (0.015 * 50 ** 2) / Math.sqrt(20 + 50 ** 2)
/** More than WCAG's printed coefficients can move L* by. */
const LIGHTNESS_MARGIN = 0.25

/**
 * Tells of two sRGB colours whether their lightness alone keeps them a CIEDE2000 apart: what chroma and hue add is
 * never negative. Much quicker than the difference itself.
 * @param first WCAG relative luminance, 0 to 1; `second` alike.
 * @returns false where only the difference itself can tell
 * @see https://doi.org/10.1002/col.20070
 */
export function areApartInLightness(first: number, second: number, deltaE: number): boolean {
  const distance = Math.abs(cieLightness(first) - cieLightness(second))
  return distance > deltaE * MOST_LIGHTNESS_WEIGHT + LIGHTNESS_MARGIN
}

/**
 * Converts an sRGB colour to CIE Lab, white D65.
 * @param r Byte 0 to 255; `g` and `b` alike.
 * @returns L 0 to 100, a, b; unrounded.
 */
export function labOfBytes(r: number, g: number, b: number): LabD65 {
  const { l, a, b: blue } = toLibraryLab65({ mode: 'rgb', r: r / 255, g: g / 255, b: b / 255 })
  return { l, a, b: blue }
}
