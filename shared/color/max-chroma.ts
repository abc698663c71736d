import { isInGamut } from './gamut-map.ts'
import type { Gamut } from './rgb-gamut.ts'

/** No colour of Display P3, and so none of sRGB, has more. */
const MOST_CHROMA = 0.5

/**
 * The largest chroma that a gamut holds at a lightness and hue.
 * @param l OKLCH lightness 0 to 1
 * @param h hue in degrees
 * @returns OKLCH chroma to about 1e-9, itself in gamut; 0 for black, white and beyond
 * @see https://www.w3.org/TR/css-color-4/#ok-lab
 */
export function maxChroma(l: number, h: number, gamut: Gamut): number {
  if (!(l > 0 && l < 1)) return 0
  let inside = 0
  let outside = MOST_CHROMA
  while (outside - inside > 1e-9) {
    const middle = (inside + outside) / 2
    if (isInGamut(l, middle, h, gamut)) inside = middle
    else outside = middle
  }
  return inside
}
