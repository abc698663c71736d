import {
  LINEAR_P3_TO_LMS,
  LINEAR_SRGB_TO_LMS,
  LMS_ROOTS_TO_OKLAB,
  LMS_TO_LINEAR_P3,
  LMS_TO_LINEAR_SRGB,
  type Matrix3,
  OKLAB_TO_LMS_ROOTS,
} from './matrices.ts'
import { linearOf } from './transfer.ts'

/** The two gamuts that Dyewright renders into. */
export type Gamut = 'srgb' | 'p3'

const FROM_LMS: { readonly [gamut in Gamut]: Matrix3 } = {
  srgb: LMS_TO_LINEAR_SRGB,
  p3: LMS_TO_LINEAR_P3,
}
const TO_LMS: { readonly [gamut in Gamut]: Matrix3 } = {
  srgb: LINEAR_SRGB_TO_LMS,
  p3: LINEAR_P3_TO_LMS,
}

/** How far a gamma-coded component may stray through conversion and still count as in gamut. */
export const GAMUT_TOLERANCE = 1e-6
const LOWEST = linearOf(-GAMUT_TOLERANCE)
const HIGHEST = linearOf(1 + GAMUT_TOLERANCE)

/**
 * Writes the linear-light components of an OKLab colour into `out`, neither clipped nor rounded.
 * @param l Lightness 0 to 1.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code OKLab_to_XYZ
 */
export function writeLinear(
  l: number,
  a: number,
  b: number,
  gamut: Gamut,
  out: Float64Array,
): Float64Array {
  const roots = OKLAB_TO_LMS_ROOTS
  const long = roots[0] * l + roots[1] * a + roots[2] * b
  const medium = roots[3] * l + roots[4] * a + roots[5] * b
  const short = roots[6] * l + roots[7] * a + roots[8] * b
  const x = long * long * long
  const y = medium * medium * medium
  const z = short * short * short
  const m = FROM_LMS[gamut]
  out[0] = m[0] * x + m[1] * y + m[2] * z
  out[1] = m[3] * x + m[4] * y + m[5] * z
  out[2] = m[6] * x + m[7] * y + m[8] * z
  return out
}

/**
 * Writes OKLab l, a, b of linear-light components into `out`, unrounded.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code XYZ_to_OKLab
 */
export function writeOklab(
  r: number,
  g: number,
  b: number,
  gamut: Gamut,
  out: Float64Array,
): Float64Array {
  const m = TO_LMS[gamut]
  const long = Math.cbrt(m[0] * r + m[1] * g + m[2] * b)
  const medium = Math.cbrt(m[3] * r + m[4] * g + m[5] * b)
  const short = Math.cbrt(m[6] * r + m[7] * g + m[8] * b)
  const k = LMS_ROOTS_TO_OKLAB
  out[0] = k[0] * long + k[1] * medium + k[2] * short
  out[1] = k[3] * long + k[4] * medium + k[5] * short
  out[2] = k[6] * long + k[7] * medium + k[8] * short
  return out
}

/** Tells whether linear components lie in 0 to 1, without any tolerance. */
export function isInside(linear: Float64Array): boolean {
  const r = linear[0]!
  const g = linear[1]!
  const b = linear[2]!
  return r >= 0 && r <= 1 && g >= 0 && g <= 1 && b >= 0 && b <= 1
}

/** Tells whether linear components lie in gamut once gamma-coded, give or take `GAMUT_TOLERANCE`. */
export function isNearlyInside(linear: Float64Array): boolean {
  const r = linear[0]!
  const g = linear[1]!
  const b = linear[2]!
  return r >= LOWEST && r <= HIGHEST && g >= LOWEST && g <= HIGHEST && b >= LOWEST && b <= HIGHEST
}
