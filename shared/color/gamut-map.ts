import { type Gamut, isInside, isNearlyInside, writeLinear, writeOklab } from './rgb-gamut.ts'
import { encodedOf } from './transfer.ts'

/** The name that every check carries: the draft allows other algorithms, and they give other verdicts. */
export const GAMUT_MAP = 'css-color-4-binary-search-local-minde'

/** Hue is powerless at or below this OKLCH chroma: the colour counts as achromatic (CSS Color 4, powerless components). */
export const POWERLESS_CHROMA = 0.000004

/** Further out the cubes of the conversion overflow a double, and no colour maps otherwise than from here. */
const FARTHEST_CHROMA = 1e100

const JND = 0.02
const EPSILON = 0.0001

// Working memory of one mapping, reused so that the hot path allocates nothing; never read across calls.
const trial = new Float64Array(3)
const clipped = new Float64Array(3)
const clippedLab = new Float64Array(3)

/**
 * Maps an OKLCH colour into an RGB gamut: CSS Color 4, binary search on chroma with local MINDE.
 * A colour already in gamut (1e-6 on gamma-coded components) comes through untouched.
 * @param l Lightness 0 to 1; 1 and above is white, 0 and below black.
 * @param c Chroma, 0 or more.
 * @param h Hue in degrees.
 * @param out Receives the result; a fresh array if left out.
 * @returns `out`: gamma-coded r, g, b in 0 to 1, unrounded.
 * @see https://www.w3.org/TR/css-color-4/#css-gamut-mapping-algorithm
 */
export function mapToGamut(
  l: number,
  c: number,
  h: number,
  gamut: Gamut,
  out: Float64Array = new Float64Array(3),
): Float64Array {
  writeMappedLinear(l, c, h, gamut, out)
  for (let i = 0; i < 3; i++) out[i] = encodedOf(unit(out[i]!))
  return out
}

/**
 * Measures the chroma that is left once a colour is mapped into sRGB.
 * @param l Lightness 0 to 1.
 * @param c Chroma, 0 or more.
 * @param h Hue in degrees.
 * @returns OKLCH chroma, unrounded; `c` itself where the colour is in gamut.
 */
export function mappedChroma(l: number, c: number, h: number): number {
  if (writeMappedLinear(l, c, h, 'srgb', clipped)) return c
  writeOklab(clipped[0]!, clipped[1]!, clipped[2]!, 'srgb', clippedLab)
  return Math.hypot(clippedLab[1]!, clippedLab[2]!)
}

/**
 * Tells whether an OKLCH colour lies in a gamut (1e-6 on gamma-coded components).
 * @param l Lightness 0 to 1.
 * @param c Chroma, 0 or more.
 * @param h Hue in degrees.
 */
export function isInGamut(l: number, c: number, h: number, gamut: Gamut): boolean {
  const chroma = countedChroma(c)
  const angle = (h * Math.PI) / 180
  return isNearlyInside(
    writeLinear(l, chroma * Math.cos(angle), chroma * Math.sin(angle), gamut, trial),
  )
}

/** Returns whether the colour was in gamut and came through untouched. */
function writeMappedLinear(
  l: number,
  c: number,
  h: number,
  gamut: Gamut,
  out: Float64Array,
): boolean {
  const chroma = countedChroma(c)
  if (l >= 1 || l <= 0) {
    out.fill(l >= 1 ? 1 : 0)
    return chroma === 0
  }
  const angle = (h * Math.PI) / 180
  const cos = Math.cos(angle)
  const sin = Math.sin(angle)
  writeLinear(l, chroma * cos, chroma * sin, gamut, trial)
  if (isNearlyInside(trial)) {
    out.set(trial)
    return true
  }
  searchChroma(l, chroma, cos, sin, gamut)
  out.set(clipped)
  return false
}

// The pseudo-code step by step; gamut and clipping are decided in linear light, which has the same bounds 0 and 1.
function searchChroma(l: number, c: number, cos: number, sin: number, gamut: Gamut): void {
  let min = 0
  let max = c
  let minInGamut = true
  if (clipDistance(l, c * cos, c * sin, gamut) < JND) return
  while (max - min > EPSILON) {
    const chroma = (min + max) / 2
    writeLinear(l, chroma * cos, chroma * sin, gamut, trial)
    if (minInGamut && isInside(trial)) {
      min = chroma
      continue
    }
    const distance = clipDistance(l, chroma * cos, chroma * sin, gamut)
    if (distance >= JND) {
      max = chroma
      continue
    }
    if (JND - distance < EPSILON) return
    minInGamut = false
    min = chroma
  }
}

/** Clips `trial` into `clipped` and measures ΔE OK between the two. */
function clipDistance(l: number, a: number, b: number, gamut: Gamut): number {
  const red = unit(trial[0]!)
  const green = unit(trial[1]!)
  const blue = unit(trial[2]!)
  clipped[0] = red
  clipped[1] = green
  clipped[2] = blue
  writeOklab(red, green, blue, gamut, clippedLab)
  const dl = clippedLab[0]! - l
  const da = clippedLab[1]! - a
  const db = clippedLab[2]! - b
  return Math.sqrt(dl * dl + da * da + db * db)
}

function countedChroma(c: number): number {
  return c <= POWERLESS_CHROMA ? 0 : Math.min(c, FARTHEST_CHROMA)
}

function unit(component: number): number {
  return Math.min(1, Math.max(0, component))
}
