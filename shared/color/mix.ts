import {
  toLibraryHsl,
  toLibraryHwb,
  toLibraryLab,
  toLibraryLch,
  toLibraryLinearRgb,
  toLibraryOklab,
  toLibraryOklch,
  toLibraryP3,
  toLibraryRgb,
  toLibraryXyz50,
  toLibraryXyz65,
} from './color-library.ts'
import { POWERLESS_CHROMA } from './gamut-map.ts'
import { type Components, libraryColor, type SpacedColor, turned } from './to-oklch.ts'

/** Spaces to mix in, by their CSS names. */
export const MIX_SPACES = [
  'oklab',
  'oklch',
  'srgb',
  'srgb-linear',
  'display-p3',
  'lab',
  'lch',
  'hsl',
  'hwb',
  'xyz-d65',
  'xyz-d50',
] as const
/** One of the spaces. */
export type MixSpace = (typeof MIX_SPACES)[number]

/** Ways round the hue circle. @see https://www.w3.org/TR/css-color-4/#hue-interpolation */
export const HUE_METHODS = ['shorter', 'longer', 'increasing', 'decreasing'] as const
/** One of the ways. */
export type HueMethod = (typeof HUE_METHODS)[number]

/** How two colours are mixed. */
export interface Mixing {
  readonly space: MixSpace
  /** Part of the second colour, 0 to 1. */
  readonly part: number
  /** In spaces with a hue; default `shorter`. */
  readonly hue?: HueMethod
}

type Triple = readonly [number, number, number]

const READ: { readonly [space in MixSpace]: (color: SpacedColor) => Triple } = {
  oklab: (color) => {
    const { l, a, b } = toLibraryOklab(inLibrary(color))
    return [l, a, b]
  },
  oklch: (color) => {
    const { l, c, h = 0 } = toLibraryOklch(inLibrary(color))
    return [l, c, h]
  },
  srgb: (color) => channels(toLibraryRgb(inLibrary(color))),
  'srgb-linear': (color) => channels(toLibraryLinearRgb(inLibrary(color))),
  'display-p3': (color) => channels(toLibraryP3(inLibrary(color))),
  lab: (color) => {
    const { l, a, b } = toLibraryLab(inLibrary(color))
    return [l, a, b]
  },
  lch: (color) => {
    const { l, c, h = 0 } = toLibraryLch(inLibrary(color))
    return [l, c, h]
  },
  hsl: (color) => {
    const { h = 0, s, l } = toLibraryHsl(inLibrary(color))
    return [h, s * 100, l * 100]
  },
  hwb: (color) => {
    const { h = 0, w, b } = toLibraryHwb(inLibrary(color))
    return [h, w * 100, b * 100]
  },
  'xyz-d65': (color) => {
    const { x, y, z } = toLibraryXyz65(inLibrary(color))
    return [x, y, z]
  },
  'xyz-d50': (color) => {
    const { x, y, z } = toLibraryXyz50(inLibrary(color))
    return [x, y, z]
  },
}

/** What a component means, so that a missing one is carried into another space; the same letter, the same meaning. */
const MEANINGS: { readonly [space in SpacedColor['space']]: readonly [string, string, string] } = {
  oklab: ['L', 'a', 'b'],
  oklch: ['L', 'C', 'H'],
  lab: ['L', 'a', 'b'],
  lch: ['L', 'C', 'H'],
  hsl: ['H', 'C', 'L'],
  hwb: ['H', 'w', 'k'],
  srgb: ['R', 'G', 'B'],
  'srgb-linear': ['R', 'G', 'B'],
  'display-p3': ['R', 'G', 'B'],
  'display-p3-linear': ['R', 'G', 'B'],
  'a98-rgb': ['R', 'G', 'B'],
  'prophoto-rgb': ['R', 'G', 'B'],
  rec2020: ['R', 'G', 'B'],
  'xyz-d65': ['R', 'G', 'B'],
  'xyz-d50': ['R', 'G', 'B'],
}

/** Where the hue stands among the components, and whether it means nothing. */
function hueOf(space: MixSpace, [, y, z]: Triple): { at: number; isPowerless: boolean } {
  if (space === 'oklch') return { at: 2, isPowerless: y <= POWERLESS_CHROMA }
  if (space === 'lch') return { at: 2, isPowerless: y <= 0.0015 }
  if (space === 'hsl') return { at: 0, isPowerless: y <= 0.001 }
  if (space === 'hwb') return { at: 0, isPowerless: y + z >= 99.999 }
  return { at: -1, isPowerless: false }
}

function channels({ r, g, b }: { r: number; g: number; b: number }): Triple {
  return [r, g, b]
}

function inLibrary({ space, components: [x, y, z] }: SpacedColor) {
  const given = [x ?? 0, y ?? 0, z ?? 0] as const
  if (space === 'oklch') return { mode: 'oklch', l: given[0], c: given[1], h: given[2] } as const
  return libraryColor(space, given)
}

/** A colour in the space of the mix; what is missing, or means nothing there, is `null`. */
function converted(color: SpacedColor, space: MixSpace): Components {
  if (color.space === space) return color.components
  const triple = READ[space](color)
  const { at, isPowerless } = hueOf(space, triple)
  const missing = new Set(
    color.components.flatMap((part, index) =>
      part === null ? [MEANINGS[color.space][index]!] : [],
    ),
  )
  const part = (index: 0 | 1 | 2) =>
    missing.has(MEANINGS[space][index]) || (index === at && isPowerless) ? null : triple[index]
  return [part(0), part(1), part(2)]
}

/** The second hue brought to the side of the first on which the way leads. */
function fixedHue(first: number, second: number, method: HueMethod): number {
  const distance = second - first
  switch (method) {
    case 'shorter':
      return distance > 180 ? second - 360 : distance < -180 ? second + 360 : second
    case 'longer':
      if (distance > 0 && distance < 180) return second - 360
      return distance > -180 && distance <= 0 ? second + 360 : second
    case 'increasing':
      return distance < 0 ? second + 360 : second
    case 'decreasing':
      return distance > 0 ? second - 360 : second
  }
}

function between(first: number, second: number, part: number): number {
  return first * (1 - part) + second * part
}

/**
 * Mixes two colours by the rules of CSS: converted to a space, missing components taken from the other, alpha
 * premultiplied, hue the way that is asked for.
 * @returns The mix in that space, unrounded, `null` for what both lack.
 * @throws {TypeError} for a part outside 0 to 1
 * @see https://www.w3.org/TR/css-color-4/#interpolation
 * @see https://www.w3.org/TR/css-color-5/#color-mix
 */
export function mixColors(first: SpacedColor, second: SpacedColor, mixing: Mixing): SpacedColor {
  const { space, part, hue = 'shorter' } = mixing
  if (!(part >= 0 && part <= 1)) throw new TypeError(`a part is 0 to 1, not ${part}`)
  const one = converted(first, space)
  const other = converted(second, space)
  const hueAt = hueOf(space, [0, 0, 0]).at
  const alphas = { first: first.alpha ?? second.alpha, second: second.alpha ?? first.alpha }
  const alpha =
    alphas.first === null || alphas.second === null
      ? null
      : between(alphas.first, alphas.second, part)
  const component = (at: 0 | 1 | 2): number | null => {
    const a = one[at] ?? other[at]
    const b = other[at] ?? one[at]
    if (a === null || b === null) return null
    if (at === hueAt) {
      const from = turned(a)
      return turned(between(from, fixedHue(from, turned(b), hue), part))
    }
    if (alpha === null || alpha === 0) return between(a, b, part)
    return between(a * alphas.first!, b * alphas.second!, part) / alpha
  }
  return { space, components: [component(0), component(1), component(2)], alpha }
}
