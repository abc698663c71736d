import type { Oklch } from '#shared/color/oklch.ts'
import { turned } from '#shared/color/to-oklch.ts'

/** How fine a card is, from the whole range to a sixteenth of its step. */
export const SHADE_ZOOMS = ['wide', 'close', 'fine'] as const
/** One of the zooms. */
export type ShadeZoom = (typeof SHADE_ZOOMS)[number]

/** Steps between chips in OKLCH lightness and chroma. */
export const SHADE_STEPS: {
  readonly [zoom in ShadeZoom]: { readonly lightness: number; readonly chroma: number }
} = {
  wide: { lightness: 0.02, chroma: 0.016 },
  close: { lightness: 0.005, chroma: 0.004 },
  fine: { lightness: 0.00125, chroma: 0.001 },
}

/** Degrees between neighbouring hues of the band, unless asked for otherwise. */
const HUE_STEP_DEGREES = 5

/** How a card is cut. */
export interface ShadeGridCut {
  /** In the middle column; its hue, or 0 where that is missing, is the card's. */
  readonly center: Oklch
  readonly zoom: ShadeZoom
  /** Odd, so that one column is the middle; default 21. */
  readonly columns?: number
  /** Default 13. */
  readonly rows?: number
  /** Default 5. */
  readonly hueStepDegrees?: number
}

/** The colours of a card. */
export interface ShadeGrid {
  /** By column. Out of 0 to 1 there is no chip. */
  readonly lightness: readonly number[]
  /** By row, from the least. */
  readonly chroma: readonly number[]
  readonly hueDegrees: number
  /** By row and column; `undefined` where there is no such colour. */
  readonly colors: readonly (readonly (Oklch | undefined)[])[]
  readonly center: { readonly row: number; readonly column: number }
  /** Neighbouring hues by column, at the centre's lightness and chroma. */
  readonly hues: readonly Oklch[]
}

/** Rows above the centre: on the wide card so many that grey is in reach, on a finer one half of them. */
function rowsAbove(chroma: number, step: number, cut: { zoom: ShadeZoom; rows: number }): number {
  const most = cut.zoom === 'wide' ? cut.rows - 2 : Math.floor(cut.rows / 2)
  return Math.max(0, Math.min(most, Math.floor(chroma / step + 1e-9)))
}

/**
 * Cuts a card around a colour: lightness across, chroma down, at its hue; alpha as it is. The centre's chip is the
 * very colour given, missing components and all.
 */
export function shadeGrid(cut: ShadeGridCut): ShadeGrid {
  const { center, zoom, columns = 21, rows = 13, hueStepDegrees = HUE_STEP_DEGREES } = cut
  const step = SHADE_STEPS[zoom]
  const l = center.l ?? 0
  const c = center.c ?? 0
  const hueDegrees = center.h ?? 0
  const column = Math.floor(columns / 2)
  const row = rowsAbove(c, step.chroma, { zoom, rows })
  const along = (length: number, middle: number, value: number, width: number) =>
    Array.from({ length }, (_, at) => value + (at - middle) * width)
  const lightness = along(columns, column, l, step.lightness)
  const chroma = along(rows, row, c, step.chroma).map((value) => Math.max(0, value))
  const { alpha } = center
  return {
    lightness,
    chroma,
    hueDegrees,
    colors: chroma.map((chipChroma, atRow) =>
      lightness.map((chipLightness, atColumn) => {
        if (atRow === row && atColumn === column) return center
        if (chipLightness < 0 || chipLightness > 1) return undefined
        return { l: chipLightness, c: chipChroma, h: hueDegrees, alpha }
      }),
    ),
    center: { row, column },
    hues: along(columns, column, hueDegrees, hueStepDegrees).map((hue, at) =>
      at === column ? center : { l, c, h: turned(hue), alpha },
    ),
  }
}
