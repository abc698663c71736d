import type { Color } from 'culori/fn'
import { toLibraryOklch } from './color-library.ts'
import { POWERLESS_CHROMA } from './gamut-map.ts'
import { LINEAR_REC2020_TO_XYZ } from './matrices.ts'
import type { Oklch } from './oklch.ts'
import { encodedOf } from './transfer.ts'

/** The color spaces of CSS Color 4, by the names that `color()` and the DTCG color module give them. */
export const COLOR_SPACES = [
  'srgb',
  'srgb-linear',
  'display-p3',
  'display-p3-linear',
  'a98-rgb',
  'prophoto-rgb',
  'rec2020',
  'xyz-d65',
  'xyz-d50',
  'hsl',
  'hwb',
  'lab',
  'lch',
  'oklab',
  'oklch',
] as const
/** One of the spaces. */
export type ColorSpace = (typeof COLOR_SPACES)[number]

/** Three components in a space's own units: hsl and hwb in degrees and 0 to 100, lab and lch with L 0 to 100. */
export type Components = readonly [number | null, number | null, number | null]

/** A colour as it was written, before conversion. */
export interface SpacedColor {
  readonly space: ColorSpace
  readonly components: Components
  /** 0 to 1, or missing. */
  readonly alpha: number | null
}

/** A colour in OKLCH, unrounded, or in one sentence why it has none. */
export type OklchReading =
  | { readonly ok: true; readonly color: Oklch }
  | { readonly ok: false; readonly reason: string }

const POWERLESS_LCH_CHROMA = 0.0015
/** Colours this close in OKLab are equal across spaces: https://www.w3.org/TR/css-color-4/#resolving-sRGB-values */
const SAME_OKLAB = 0.00001

/**
 * Converts a colour of any CSS Color 4 space to OKLCH; missing components of another space count as 0 on the way.
 * Hue becomes missing, and chroma 0, where a conversion gives an achromatic colour.
 * @returns The colour unrounded, or why it has none: lightness outside 0 to 1 (by more than 0.00001), or not finite.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion
 */
export function oklchOf({ space, components, alpha }: SpacedColor): OklchReading {
  if (components.some((component) => component !== null && !Number.isFinite(component))) {
    return { ok: false, reason: 'A component is not a finite number.' }
  }
  const [first, second, third] = components
  if (space === 'oklch') {
    return withinLightness({ l: first, c: second, h: third === null ? null : turned(third), alpha })
  }
  const converted = toLibraryOklch(libraryColor(space, [first ?? 0, second ?? 0, third ?? 0]))
  const { l, c, h } = converted
  if (!(Number.isFinite(l) && Number.isFinite(c))) {
    return { ok: false, reason: 'Its conversion to OKLCH is not a finite colour.' }
  }
  const achromatic = h === undefined || c <= POWERLESS_CHROMA || isPowerlessLch(space, second)
  return withinLightness({ l, c: achromatic ? 0 : c, h: achromatic ? null : turned(h), alpha })
}

/**
 * Normalises an angle.
 * @param degrees Any finite angle.
 * @returns Degrees, 0 ≤ result < 360; an angle already there is returned as it is.
 */
export function turned(degrees: number): number {
  const rest = degrees % 360
  if (rest < 0) return (rest + 360) % 360
  return rest === 0 ? 0 : rest
}

function withinLightness(color: Oklch): OklchReading {
  const l = color.l ?? 0
  if (l < -SAME_OKLAB || l > 1 + SAME_OKLAB) {
    return { ok: false, reason: `Its OKLCH lightness ${l.toFixed(4)} lies outside 0 to 1.` }
  }
  if (color.l === null || (l >= 0 && l <= 1)) return { ok: true, color }
  return { ok: true, color: { ...color, l: l < 0 ? 0 : 1 } }
}

function isPowerlessLch(space: ColorSpace, chroma: number | null): boolean {
  return space === 'lch' && chroma !== null && chroma <= POWERLESS_LCH_CHROMA
}

/** A colour of any space as the library takes it; what the library decodes otherwise is brought to XYZ. */
export function libraryColor(
  space: Exclude<ColorSpace, 'oklch'>,
  [x, y, z]: readonly [number, number, number],
): Color {
  switch (space) {
    case 'srgb':
      return { mode: 'rgb', r: x, g: y, b: z }
    case 'srgb-linear':
      return { mode: 'lrgb', r: x, g: y, b: z }
    case 'display-p3':
      return { mode: 'p3', r: x, g: y, b: z }
    case 'display-p3-linear':
      return { mode: 'p3', r: encodedOf(x), g: encodedOf(y), b: encodedOf(z) }
    case 'a98-rgb':
      return { mode: 'a98', r: x, g: y, b: z }
    case 'prophoto-rgb':
      return { mode: 'prophoto', r: x, g: y, b: z }
    case 'rec2020':
      return xyzOfRec2020(displayLight(x), displayLight(y), displayLight(z))
    case 'xyz-d65':
      return { mode: 'xyz65', x, y, z }
    case 'xyz-d50':
      return { mode: 'xyz50', x, y, z }
    case 'hsl':
      return { mode: 'hsl', h: x, s: y / 100, l: z / 100 }
    case 'hwb':
      return { mode: 'hwb', h: x, w: y / 100, b: z / 100 }
    case 'lab':
      return { mode: 'lab', l: x, a: y, b: z }
    case 'lch':
      return { mode: 'lch', l: x, c: y, h: z }
    case 'oklab':
      return { mode: 'oklab', l: x, a: y, b: z }
  }
}

// CSS Color 4 reads rec2020 as display-referred, gamma 2.40; the library decodes it with the camera curve of BT.2020.
function displayLight(encoded: number): number {
  return Math.sign(encoded) * Math.abs(encoded) ** 2.4
}

function xyzOfRec2020(r: number, g: number, b: number): Color {
  const m = LINEAR_REC2020_TO_XYZ
  return {
    mode: 'xyz65',
    x: m[0] * r + m[1] * g + m[2] * b,
    y: m[3] * r + m[4] * g + m[5] * b,
    z: m[6] * r + m[7] * g + m[8] * b,
  }
}
