import { compositeChannel } from './composite.ts'
import { contrastRatio, relativeLuminance } from './luminance.ts'
import { maxChroma } from './max-chroma.ts'
import type { Oklch } from './oklch.ts'
import { type RenderedColor, renderColor } from './render.ts'

/** One step of a ramp. */
export interface RampStep {
  readonly color: Oklch
  readonly rendered: RenderedColor
  /** WCAG ratio to the ground as both ship, never rounded. */
  readonly ratio: number
  /** Present where a ratio was asked for. */
  readonly wanted?: number
  /** Present and true where neither black nor white reaches it. */
  readonly isShort?: true
}

/** What a ramp is made from. */
export interface RampSeed {
  /** Its hue, alpha and chroma; the chroma gives way where sRGB does not hold it. */
  readonly seed: Oklch
  /** Opaque. */
  readonly ground: Oklch
}

const HALVINGS = 24

function toShade(seed: Oklch, l: number): Oklch {
  const hue = seed.h ?? 0
  const c = seed.c === null ? null : Math.min(seed.c, maxChroma(l, hue, 'srgb'))
  return { l, c, h: seed.h, alpha: seed.alpha }
}

function stepAt({ seed, ground }: RampSeed, l: number): Omit<RampStep, 'wanted'> {
  const color = toShade(seed, l)
  const rendered = renderColor(color)
  const under = renderColor(ground)
  const alpha = rendered.a / 255
  const ratio = contrastRatio(
    relativeLuminance(
      compositeChannel(rendered.r, alpha, under.r),
      compositeChannel(rendered.g, alpha, under.g),
      compositeChannel(rendered.b, alpha, under.b),
    ),
    relativeLuminance(under.r, under.g, under.b),
  )
  return { color, rendered, ratio }
}

/** The lightness nearest the ground's that has at least the ratio, on the side that reaches further. */
function stepWith(from: RampSeed, wanted: number): RampStep {
  const black = stepAt(from, 0)
  const white = stepAt(from, 1)
  const isDark = black.ratio >= white.ratio
  const extreme = isDark ? black : white
  if (extreme.ratio < wanted) return { ...extreme, wanted, isShort: true }
  let far = isDark ? 0 : 1
  let near = from.ground.l ?? 0
  let answer = extreme
  for (let halving = 0; halving < HALVINGS; halving++) {
    const middle = (near + far) / 2
    const step = stepAt(from, middle)
    if (step.ratio >= wanted) {
      far = middle
      answer = step
    } else {
      near = middle
    }
  }
  return { ...answer, wanted }
}

/**
 * A scale of one hue at given contrast ratios to a ground: each step has at least its ratio, and no more than it must.
 * @param ratios 1 to 21 each
 * @throws {TypeError} for a ratio outside that
 */
export function rampByRatio(from: RampSeed, ratios: readonly number[]): RampStep[] {
  for (const ratio of ratios) {
    if (!(ratio >= 1 && ratio <= 21)) throw new TypeError(`a ratio is 1 to 21, not ${ratio}`)
  }
  return ratios.map((wanted) => stepWith(from, wanted))
}

/**
 * A scale of one hue at even steps of OKLCH lightness, both ends included.
 * @param steps two or more
 * @throws {TypeError} for fewer, and for a lightness outside 0 to 1
 */
export function rampByLightness(
  from: RampSeed,
  scale: { readonly steps: number; readonly from: number; readonly to: number },
): RampStep[] {
  const isInside = (l: number) => l >= 0 && l <= 1
  if (!(Number.isInteger(scale.steps) && scale.steps >= 2)) {
    throw new TypeError(`a scale has two steps or more, not ${scale.steps}`)
  }
  if (!isInside(scale.from) || !isInside(scale.to)) {
    throw new TypeError(`a lightness is 0 to 1, not ${scale.from} to ${scale.to}`)
  }
  return Array.from({ length: scale.steps }, (_, at) =>
    stepAt(from, scale.from + ((scale.to - scale.from) * at) / (scale.steps - 1)),
  )
}
