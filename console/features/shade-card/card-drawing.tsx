import type { ReactNode } from 'react'
import { type CardChip, type CutCard, isWhole, shapeEdges, type WholeRun } from './card-cut.ts'
import {
  CHIP_HEIGHT,
  type CardGeometry,
  chipOutline,
  HUE_HEIGHT,
  ROW_PITCH,
} from './card-geometry.ts'

/** Over the chips: the band of hues, and what parts it from them. */
export const HUE_ROW = HUE_HEIGHT + 16
const AXIS = 30

export interface Ring {
  /** -1 is the band of hues. */
  readonly row: number
  readonly column: number
  readonly kind: 'present' | 'tried'
}

const topOf = (row: number) => (row < 0 ? 0 : HUE_ROW + row * ROW_PITCH)
const heightOf = (row: number) => (row < 0 ? HUE_HEIGHT : CHIP_HEIGHT)

/** The card as it is pinned up; everything that can be done with it lies over the drawing. */
export function CardDrawing({
  card,
  geometry,
  rings,
  run,
}: {
  card: CutCard
  geometry: CardGeometry
  rings: readonly Ring[]
  run: WholeRun | undefined
}) {
  const { pitch, chip, labels } = geometry
  const rows = card.grid.chroma.length
  const width = labels + geometry.columns * pitch
  const height = HUE_ROW + rows * ROW_PITCH + AXIS
  const chipAt = (row: number, column: number) =>
    row < 0 ? card.hues[column] : card.rows[row]?.[column]
  const places = [card.hues, ...card.rows].flatMap((chips, at) =>
    chips.map((_, column) => ({ row: at - 1, column })),
  )
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      aria-hidden="true"
      className="own-colors block overflow-visible"
    >
      <g transform={`translate(${labels} 0)`}>
        {places.map(({ row, column }) => (
          <Chip
            key={`${row} ${column}`}
            chip={chipAt(row, column)}
            x={column * pitch}
            y={topOf(row)}
            width={chip}
            height={heightOf(row)}
          />
        ))}
        <ShapeLine card={card} geometry={geometry} />
        {rings.map((ring) => (
          <RingAt key={`${ring.kind} ${ring.row}`} ring={ring} geometry={geometry}>
            <Chip
              chip={chipAt(ring.row, ring.column)}
              x={ring.column * pitch}
              y={topOf(ring.row)}
              width={chip}
              height={heightOf(ring.row)}
            />
          </RingAt>
        ))}
        <LimitTicks run={run} geometry={geometry} top={HUE_ROW + rows * ROW_PITCH + AXIS - 10} />
      </g>
      <AxisFigures card={card} geometry={geometry} />
    </svg>
  )
}

function Chip({
  chip,
  x,
  y,
  width,
  height,
}: {
  chip: CardChip | undefined
  x: number
  y: number
  width: number
  height: number
}) {
  if (chip === undefined || chip.gamut === 'beyond') return null
  const outline = chipOutline({
    width,
    height,
    isNotched: !isWhole(chip),
    isCut: chip.gamut === 'p3',
  })
  return (
    <path
      d={outline}
      transform={`translate(${x} ${y})`}
      fill={chip.hex}
      // The screen paints what it can of a colour outside sRGB; where it cannot, the hex stands.
      style={chip.gamut === 'p3' ? { fill: chip.css } : undefined}
    />
  )
}

/** One ink line in the gaps round every whole chip. */
function ShapeLine({ card, geometry: { pitch } }: { card: CutCard; geometry: CardGeometry }) {
  const d = shapeEdges(card.rows).map(({ column, row, side }) => {
    const [left, right] = [column * pitch - 1.5, (column + 1) * pitch - 1.5]
    const [top, bottom] = [topOf(row) - 1.5, topOf(row) + ROW_PITCH - 1.5]
    const lines: Readonly<Record<typeof side, string>> = {
      left: `M${left} ${top}V${bottom}`,
      right: `M${right} ${top}V${bottom}`,
      top: `M${left} ${top}H${right}`,
      bottom: `M${left} ${bottom}H${right}`,
    }
    return lines[side]
  })
  return (
    <path
      d={d.join('')}
      fill="none"
      strokeWidth="2"
      strokeLinecap="square"
      className="mark-ring stroke-ink"
    />
  )
}

/** A ring outside the chip, on a halo of the page's ground. */
function RingAt({
  ring: { row, column, kind },
  geometry: { pitch, chip },
  children,
}: {
  ring: Ring
  geometry: CardGeometry
  children: ReactNode
}) {
  const [x, y, height] = [column * pitch, topOf(row), heightOf(row)]
  return (
    <>
      <rect x={x - 5} y={y - 5} width={chip + 10} height={height + 10} className="fill-ground" />
      <rect
        x={x - 3.5}
        y={y - 3.5}
        width={chip + 7}
        height={height + 7}
        fill="none"
        strokeWidth={kind === 'tried' ? 3 : 2}
        className={`mark-ring ${kind === 'tried' ? 'stroke-woad' : 'stroke-ink'}`}
      />
      {children}
    </>
  )
}

/** Where the allowed shape ends in its row, brought down to the words under the axis. */
function LimitTicks({
  run,
  geometry: { pitch },
  top,
}: {
  run: WholeRun | undefined
  geometry: CardGeometry
  top: number
}) {
  if (run === undefined) return null
  const ticks = [
    run.darker && `M${run.from * pitch - 1.5} ${top}v10h-8`,
    run.lighter && `M${(run.to + 1) * pitch - 1.5} ${top}v10h8`,
  ]
  return (
    <path
      d={ticks.filter((tick) => tick !== undefined).join('')}
      fill="none"
      className="mark-ring stroke-ink"
    />
  )
}

function AxisFigures({ card: { grid }, geometry }: { card: CutCard; geometry: CardGeometry }) {
  const { labels, pitch, chip } = geometry
  const every = chip < 24 || geometry.columns < 21 ? 3 : 2
  return (
    <g className="figures fill-ink-soft text-12">
      {grid.chroma.map(
        (chroma, row) =>
          row % 2 === 0 && (
            <text key={chroma} x={labels - 8} y={topOf(row) + 16} textAnchor="end">
              {chroma.toFixed(3).slice(geometry.columns < 21 ? 1 : 0)}
            </text>
          ),
      )}
      {grid.lightness.map(
        (lightness, column) =>
          column % every === 0 &&
          lightness >= 0 &&
          lightness <= 1 && (
            <text
              key={lightness}
              x={labels + column * pitch + chip / 2}
              y={topOf(grid.chroma.length) + 12}
              textAnchor="middle"
            >
              {lightness.toFixed(3).slice(geometry.columns < 21 ? 1 : 0)}
            </text>
          ),
      )}
    </g>
  )
}
