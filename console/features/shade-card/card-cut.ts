import type { ColorProbe, ProbedBreach } from '#shared/checks/color-probe.ts'
import { chipOf, type ShadeChip } from '#shared/checks/shade-card.ts'
import { type ShadeGrid, shadeGrid } from '#shared/checks/shade-grid.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'

/** A chip as it is pinned up: what trying it writes, and what that comes to. */
export interface CardChip extends ShadeChip {
  /** CSS: trying the chip tries this very text, so that the two cannot differ. */
  readonly css: string
}

export interface CardCut {
  /** The colour in the middle. */
  readonly center: Oklch
  readonly columns: number
  readonly hueStepDegrees: number
}

/** A card that is being cut: rows come one by one. */
export interface CutCard {
  readonly grid: ShadeGrid
  /** By row and column; where nothing can be pinned up, or nothing is cut yet, there is none. */
  readonly rows: readonly (readonly (CardChip | undefined)[])[]
  readonly hues: readonly CardChip[]
}

/**
 * Yields a card row by row, so that a page stays live while it is cut. Each chip is judged as the text that trying
 * it would write.
 * @param cssOf how a colour is written
 */
export function* cutCard(
  probe: ColorProbe,
  cut: CardCut,
  cssOf: (color: Oklch) => string,
): Generator<CutCard, void> {
  const grid = shadeGrid({ ...cut, zoom: 'wide' })
  const chip = (color: Oklch): CardChip => {
    const css = cssOf(color)
    const read = parseColor(css)
    if (!read.ok) throw new TypeError(`${css} is no colour: ${read.reason}`)
    return { ...chipOf(probe, read.color), css }
  }
  const hues = grid.hues.map(chip)
  const rows: (CardChip | undefined)[][] = []
  for (const colors of grid.colors) {
    rows.push(colors.map((color) => (color === undefined ? undefined : shown(chip(color)))))
    yield { grid, rows: [...rows], hues }
  }
}

/** What Display P3 cannot hold is left out. */
const shown = (chip: CardChip) => (chip.gamut === 'beyond' ? undefined : chip)

/** What ends the allowed shape on one side of a row. */
export interface CardLimit {
  /** Column of the first chip that is not whole. */
  readonly column: number
  readonly breach: ProbedBreach
}

/** The run of whole chips of a row that lies nearest to a column, and what ends it. */
export interface WholeRun {
  readonly row: number
  readonly from: number
  readonly to: number
  readonly darker?: CardLimit
  readonly lighter?: CardLimit
}

type Rows = CutCard['rows']

/** The run nearest to the centre: in its own row, else in the nearest row that has one. */
export function nearestRun(rows: Rows, { row, column }: ShadeGrid['center']): WholeRun | undefined {
  const order = rows.map((_, at) => at).sort((a, b) => Math.abs(a - row) - Math.abs(b - row))
  for (const at of order) {
    const [nearest] = runsOf(rows[at] ?? []).sort(
      (a, b) => distance(a, column) - distance(b, column),
    )
    if (nearest === undefined) continue
    const [from, to] = nearest
    const darker = limitAt(rows, at, from - 1)
    const lighter = limitAt(rows, at, to + 1)
    return {
      row: at,
      from,
      to,
      ...(darker === undefined ? {} : { darker }),
      ...(lighter === undefined ? {} : { lighter }),
    }
  }
  return undefined
}

type Run = readonly [from: number, to: number]

function runsOf(chips: readonly (CardChip | undefined)[]): Run[] {
  const runs: Run[] = []
  for (let at = 0; at < chips.length; at++) {
    if (!isWhole(chips[at])) continue
    const last = runs.at(-1)
    if (last !== undefined && last[1] === at - 1) runs[runs.length - 1] = [last[0], at]
    else runs.push([at, at])
  }
  return runs
}

export const isWhole = (chip: CardChip | undefined): boolean => chip?.outcome === 'whole'

const distance = ([from, to]: Run, column: number) =>
  column < from ? from - column : column > to ? column - to : 0

function limitAt(rows: Rows, row: number, column: number): CardLimit | undefined {
  const breach = rows[row]?.[column]?.breaches[0]
  return breach === undefined ? undefined : { column, breach }
}

/** One side of a chip at which the allowed shape ends, in columns and rows. */
export interface ShapeEdge {
  readonly column: number
  readonly row: number
  readonly side: 'left' | 'right' | 'top' | 'bottom'
}

/** All sides at which whole chips border on others: the line round the allowed shape. */
export function shapeEdges(rows: Rows): ShapeEdge[] {
  const whole = (row: number, column: number) => isWhole(rows[row]?.[column])
  return rows.flatMap((chips, row) =>
    chips.flatMap((chip, column): ShapeEdge[] => {
      if (!isWhole(chip)) return []
      const sides = [
        ['left', whole(row, column - 1)],
        ['right', whole(row, column + 1)],
        ['top', whole(row - 1, column)],
        ['bottom', whole(row + 1, column)],
      ] as const
      return sides.flatMap(([side, goesOn]) => (goesOn ? [] : [{ column, row, side }]))
    }),
  )
}
