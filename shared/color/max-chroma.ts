import { isInGamut } from './gamut-map.ts'
import type { Gamut } from './rgb-gamut.ts'

/** No colour of Display P3, and so none of sRGB, has more. */
const MOST_CHROMA = 0.5
/** No dip of a gamut's edge is narrower than this. */
const STEP = 0.005

/**
 * The chroma up to which a gamut holds every chroma at a lightness and hue. Near blue the edge dips before it comes
 * out again, so that the primary itself has more.
 * @param l OKLCH lightness 0 to 1
 * @param h hue in degrees
 * @returns OKLCH chroma to about 1e-9, itself in gamut; 0 for black, white and beyond
 * @see https://www.w3.org/TR/css-color-4/#ok-lab
 */
export function maxChroma(l: number, h: number, gamut: Gamut): number {
  if (!(l > 0 && l < 1)) return 0
  let inside = 0
  let outside = STEP
  while (outside < MOST_CHROMA && isInGamut(l, outside, h, gamut)) {
    inside = outside
    outside += STEP
  }
  while (outside - inside > 1e-9) {
    const middle = (inside + outside) / 2
    if (isInGamut(l, middle, h, gamut)) inside = middle
    else outside = middle
  }
  return inside
}
