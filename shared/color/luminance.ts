import { linearOf } from './transfer.ts'

const LINEAR = Float64Array.from({ length: 256 }, (_, byte) => linearOf(byte / 255))
const scaled = (weight: number) => LINEAR.map((linear) => weight * linear)

const SRGB_R = scaled(0.2126)
const SRGB_G = scaled(0.7152)
const SRGB_B = scaled(0.0722)
const P3_R = scaled(0.228975)
const P3_G = scaled(0.691739)
const P3_B = scaled(0.079286)

/**
 * Measures WCAG relative luminance of an sRGB colour, with the printed coefficients and the threshold 0.04045.
 * @param r Byte 0 to 255; `g` and `b` alike.
 * @returns 0 (black) to 1 (white), unrounded.
 * @see https://www.w3.org/TR/WCAG22/#dfn-relative-luminance
 */
export function relativeLuminance(r: number, g: number, b: number): number {
  return SRGB_R[r]! + SRGB_G[g]! + SRGB_B[b]!
}

/**
 * Measures the luminance of a Display P3 colour, for a ratio outside WCAG's definition.
 * @param r Display P3 byte 0 to 255; `g` and `b` alike.
 * @returns 0 (black) to 1 (white), unrounded.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code Y row of linear Display P3 to XYZ, six places
 */
export function relativeLuminanceP3(r: number, g: number, b: number): number {
  return P3_R[r]! + P3_G[g]! + P3_B[b]!
}

/**
 * Measures the contrast ratio of two luminances, whichever is the lighter.
 * @param y1 Luminance 0 to 1; `y2` alike.
 * @returns 1 to 21, never rounded.
 * @see https://www.w3.org/TR/WCAG22/#dfn-contrast-ratio
 */
export function contrastRatio(y1: number, y2: number): number {
  const ratio = y1 > y2 ? (y1 + 0.05) / (y2 + 0.05) : (y2 + 0.05) / (y1 + 0.05)
  return Math.min(ratio, 21)
}

/**
 * Converts a relative luminance to CIE lightness.
 * @param luminance 0 to 1
 * @returns L* from 0 to 100, unrounded
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code XYZ_to_Lab
 */
export function cieLightness(luminance: number): number {
  return luminance > 216 / 24389 ? 116 * Math.cbrt(luminance) - 16 : (24389 / 27) * luminance
}
