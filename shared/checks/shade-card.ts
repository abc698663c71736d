import { formatHex } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { breachesOf, type ColorProbe, createColorProbe, type ProbedBreach } from './color-probe.ts'
import type { ColorPlace } from './color-place.ts'
import type { Evaluation } from './evaluation.ts'
import { stateAt } from './model-graph.ts'
import type { ModelFault, WaiverModel } from './model.ts'
import { STATE_COUNT } from './resolved.ts'
import { type ShadeGrid, type ShadeGridCut, shadeGrid } from './shade-grid.ts'

/**
 * One shade of a card. `whole`: every finding that hangs on the colour passes, is waived or exempt, in all themes
 * and states; `breaching`: one or more do not; `refused`: a theme's ground and ink would lie too near.
 */
export interface ShadeChip {
  readonly color: Oklch
  /** As it ships in sRGB. */
  readonly hex: string
  /** The narrowest gamut that holds it: `p3` has a cut corner, `beyond` is left out of the card. */
  readonly gamut: RenderedColor['gamut']
  readonly outcome: 'whole' | 'breaching' | 'refused'
  /** The one furthest short of its requirement first. */
  readonly breaches: readonly ProbedBreach[]
  readonly faults: readonly ModelFault[]
}

/** A card of chips, and the band of neighbouring hues above it. */
export interface ShadeCard {
  readonly grid: ShadeGrid
  /** By row and column; `undefined` where lightness leaves 0 to 1. */
  readonly chips: readonly (readonly (ShadeChip | undefined)[])[]
  /** By column. */
  readonly hues: readonly ShadeChip[]
}

/** What a chip comes to: exactly what a full check of the system with its colour set says. */
export function chipOf(probe: ColorProbe, color: Oklch): ShadeChip {
  const faults = probe.set(color)
  const { token, theme, state = 'rest' } = probe.place
  const at = probe.evaluation.resolved.themes.get(theme)! * STATE_COUNT + stateAt(state)
  const { r, g, b, a, gamut } = probe.values.cellsOf(token)[at]!.color.rendered
  const breaches = faults.length > 0 ? [] : breachesOf(probe)
  const outcome =
    faults.length > 0 ? 'refused' : breaches.length > 0 ? 'breaching' : ('whole' as const)
  return { color, hex: formatHex(r, g, b, a), gamut, outcome, breaches, faults }
}

/** Yields the chips of a card row by row, so that a caller can let a frame pass between two of them. */
export function* shadeRows(
  probe: ColorProbe,
  grid: ShadeGrid,
): Generator<readonly (ShadeChip | undefined)[], void> {
  for (const colors of grid.colors) {
    yield colors.map((color) => (color === undefined ? undefined : chipOf(probe, color)))
  }
}

/**
 * The shade card of a place: what every lightness and chroma around a colour would come to.
 * @param cut.center default: the colour that the place shows now
 * @throws TypeError when the system has no such token or theme
 * @example shadeCard(evaluation, { token: 'tok_1', theme: 'thm_light' }, { zoom: 'wide' })
 */
export function shadeCard(
  evaluation: Evaluation,
  place: ColorPlace,
  cut: Omit<ShadeGridCut, 'center'> & Partial<Pick<ShadeGridCut, 'center'>>,
  options: { readonly waivers?: readonly WaiverModel[] } = {},
): ShadeCard {
  const probe = createColorProbe(evaluation, place, options)
  const grid = shadeGrid({ center: probe.present, ...cut })
  return {
    grid,
    chips: [...shadeRows(probe, grid)],
    hues: grid.hues.map((color) => chipOf(probe, color)),
  }
}
