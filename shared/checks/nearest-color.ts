import { compositeChannel } from '#shared/color/composite.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { type ColorTrial, searchNearest } from '#shared/color/nearest-search.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { type RenderedColor, renderColor } from '#shared/color/render.ts'
import { renderedDifference } from '#shared/color/rendered-difference.ts'
import { smallestDisjoint } from './smallest-disjoint.ts'

/** A colour to be told from, by a ratio. Opaque. */
export interface ColorDemand {
  readonly color: Oklch
  /** 1 to 21. */
  readonly required: number
}

/** What a search against bare colours found. */
export interface NearestColor {
  /** Absent where no colour of the hue meets every demand, or none was found within the budget. */
  readonly found?: { readonly color: Oklch; readonly deltaEOk: number }
  /** Positions of the fewest demands that cannot be met together; empty where one is found. */
  readonly conflict: readonly number[]
  readonly evaluations: number
  readonly isStopped: boolean
}

/** Evaluations that a search may take, unless told otherwise. */
const BUDGET = 8000
const LIGHTNESS_STEPS = 200
const CHROMA_STEPS = 12
const WIDEST_CHROMA = 0.4

/** The WCAG ratio of a colour laid on an opaque one, both as they ship in sRGB; never rounded. */
export function ratioOnColor(color: RenderedColor, under: RenderedColor): number {
  const alpha = color.a / 255
  return contrastRatio(
    relativeLuminance(
      compositeChannel(color.r, alpha, under.r),
      compositeChannel(color.g, alpha, under.g),
      compositeChannel(color.b, alpha, under.b),
    ),
    relativeLuminance(under.r, under.g, under.b),
  )
}

/** Where each demand is met, over colours of every lightness and many chromas. */
function metColumns(
  start: Oklch,
  demands: readonly { readonly under: RenderedColor; readonly required: number }[],
): { readonly columns: Uint8Array[]; readonly evaluations: number } {
  const colors = Array.from({ length: LIGHTNESS_STEPS + 1 }, (_, at) => at / LIGHTNESS_STEPS)
    .flatMap((l) =>
      Array.from({ length: (start.c ?? 0) > 0 ? CHROMA_STEPS : 1 }, (_, step) => ({
        ...start,
        l,
        c: (step / CHROMA_STEPS) * WIDEST_CHROMA,
      })),
    )
    .map(renderColor)
  const columns = demands.map(({ under, required }) =>
    Uint8Array.from(colors, (color) => (ratioOnColor(color, under) >= required ? 1 : 0)),
  )
  return { columns, evaluations: colors.length }
}

/**
 * The colour nearest to one, hue and alpha kept, that has every required ratio to some others.
 * @param demands opaque colours; none: the colour itself
 * @throws {TypeError} for a translucent colour among them, and for a ratio outside 1 to 21
 */
export function nearestColor(
  start: Oklch,
  demands: readonly ColorDemand[],
  budget = BUDGET,
): NearestColor {
  const sides = demands.map(({ color, required }) => {
    const under = renderColor(color)
    if (under.a < 255) throw new TypeError('a color to be told from is opaque')
    if (!(required >= 1 && required <= 21)) throw new TypeError('a ratio is 1 to 21')
    return { under, required }
  })
  const before = renderColor(start)
  const trial = (color: Oklch): ColorTrial => {
    const rendered = renderColor(color)
    let short = Number.NEGATIVE_INFINITY
    for (const { under, required } of sides) {
      short = Math.max(short, Math.log(required / ratioOnColor(rendered, under)))
    }
    const cost = renderedDifference(before, rendered, false)
    return { cost, sum: cost, short }
  }
  const { found, evaluations, isStopped } = searchNearest({ start, gamut: 'srgb', trial, budget })
  if (found !== undefined) {
    const nearest = { color: found.color, deltaEOk: found.cost }
    return { found: nearest, conflict: [], evaluations, isStopped }
  }
  const tried = metColumns(start, sides)
  const conflict = smallestDisjoint(tried.columns) ?? []
  return { conflict, evaluations: evaluations + tried.evaluations, isStopped }
}
