import { type KeyboardEvent, memo, type PointerEvent, useMemo, useRef, useState } from 'react'
import type { CardChip, CutCard } from './card-cut.ts'
import { HUE_ROW } from './card-drawing.tsx'
import { type CardGeometry, HUE_HEIGHT, ROW_PITCH } from './card-geometry.ts'

export interface CardChipsProps {
  readonly card: CutCard
  readonly geometry: CardGeometry
  /** Accessible name of a chip. */
  readonly nameOf: (chip: CardChip) => string
  /** What is tried, as CSS. */
  readonly tried: string | undefined
  readonly onTry: (chip: CardChip, isHue: boolean) => void
  /** The chip under the pointer or the focus, or none. */
  readonly onLook: (chip: CardChip | undefined) => void
}

interface Place {
  /** -1 is the band of hues. */
  readonly row: number
  readonly column: number
}

/** The chips as things to walk, to point at and to press, over the drawing: one tab stop for all of them. */
export const CardChips = memo(function CardChips(props: CardChipsProps) {
  const { card, geometry, tried, onTry, onLook } = props
  const grid = useRef<HTMLDivElement>(null)
  const { center } = card.grid
  const [stop, setStop] = useState<Place>()
  const chipAt = ({ row, column }: Place) =>
    row < 0 ? card.hues[column] : card.rows[row]?.[column]
  const current = stop !== undefined && chipAt(stop) ? stop : center

  function walk(event: KeyboardEvent) {
    const step = STEPS[event.key]
    if (step === undefined || event.altKey || event.ctrlKey || event.metaKey) return
    event.preventDefault()
    const next = nextPlace(card, current, step)
    setStop(next)
    grid.current?.querySelector<HTMLElement>(`[data-chip="${next.row} ${next.column}"]`)?.focus()
  }

  /** Only a pointer that moves looks: a page that moves under one that rests does not. */
  function draw(event: PointerEvent, chip: CardChip, place: Place) {
    onLook(chip)
    if (event.type === 'pointerdown') {
      // A finger, too, is followed from chip to chip.
      event.currentTarget.releasePointerCapture(event.pointerId)
      setStop(place)
    } else if (event.buttons === 1) {
      setStop(place)
      onTry(chip, place.row < 0)
    }
  }

  const rows = useMemo(() => chipRows(card), [card])
  return (
    // biome-ignore lint/a11y/useSemanticElements: a table has no keys of its own; the chips are walked in two directions
    <div
      ref={grid}
      role="grid"
      tabIndex={-1}
      aria-label="Shade card: hues, then chroma down and lightness across"
      onKeyDown={walk}
      onPointerLeave={() => onLook(undefined)}
      onBlur={() => onLook(undefined)}
      className="absolute inset-0 touch-pan-y select-none"
      style={{ left: geometry.labels }}
    >
      {rows.map((row) => (
        // biome-ignore lint/a11y/useSemanticElements lint/a11y/useFocusableInteractive: a row of the grid; its cells take the focus
        <div key={row.key} role="row">
          {row.chips.map(({ key, chip, place }) => (
            <ChipButton
              key={key}
              chip={chip}
              place={place}
              geometry={geometry}
              name={props.nameOf(chip)}
              isStop={place.row === current.row && place.column === current.column}
              isTried={chip.css === tried}
              onPress={() => onTry(chip, place.row < 0)}
              onFocus={() => {
                setStop(place)
                onLook(chip)
              }}
              onPointer={(event) => draw(event, chip, place)}
            />
          ))}
        </div>
      ))}
    </div>
  )
})

function ChipButton({
  chip,
  place,
  geometry,
  name,
  isStop,
  isTried,
  onPress,
  onFocus,
  onPointer,
}: {
  chip: CardChip
  place: Place
  geometry: CardGeometry
  name: string
  isStop: boolean
  isTried: boolean
  onPress: () => void
  onFocus: () => void
  onPointer: (event: PointerEvent) => void
}) {
  return (
    // biome-ignore lint/a11y/useSemanticElements: a cell of the grid that is pressed
    <button
      type="button"
      role="gridcell"
      data-chip={`${place.row} ${place.column}`}
      data-outcome={chip.outcome}
      data-css={chip.css}
      tabIndex={isStop ? 0 : -1}
      aria-label={name}
      aria-selected={isTried}
      onClick={onPress}
      onFocus={onFocus}
      onPointerDown={onPointer}
      onPointerMove={onPointer}
      className="absolute focus-visible:z-1"
      style={boxOf(place, geometry)}
    />
  )
}

/** The hues and the rows of the card with what is pinned up there, keyed by lightness and chroma. */
function chipRows({ grid, hues, rows }: CutCard) {
  const named = (row: number, chips: readonly (CardChip | undefined)[], names: readonly number[]) =>
    chips.flatMap((chip, column) =>
      chip === undefined || chip.gamut === 'beyond'
        ? []
        : [{ key: String(names[column]), chip, place: { row, column } }],
    )
  return [
    { key: 'hues', chips: named(-1, hues, grid.lightness) },
    ...rows.map((chips, row) => ({
      key: String(grid.chroma[row]),
      chips: named(row, chips, grid.lightness),
    })),
  ]
}

function boxOf({ row, column }: Place, { pitch }: CardGeometry) {
  const left = column * pitch - 1.5
  return row < 0
    ? { left, top: -1.5, width: pitch, height: HUE_HEIGHT + 3 }
    : { left, top: HUE_ROW + row * ROW_PITCH - 1.5, width: pitch, height: ROW_PITCH }
}

type Step = readonly [down: number, across: number]

const STEPS: Readonly<Record<string, Step>> = {
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  Home: [0, Number.NEGATIVE_INFINITY],
  End: [0, Number.POSITIVE_INFINITY],
}

/** The next place with a chip in that direction; the same where there is none. */
function nextPlace(card: CutCard, { row, column }: Place, [down, across]: Step): Place {
  const has = (place: Place) => {
    const chip = place.row < 0 ? card.hues[place.column] : card.rows[place.row]?.[place.column]
    return chip !== undefined && chip.gamut !== 'beyond'
  }
  const columns = Array.from({ length: card.grid.lightness.length }, (_, at) => at)
  const rows = Array.from({ length: card.rows.length + 1 }, (_, at) => at - 1)
  const along: Place[] =
    across !== 0
      ? columns
          .filter((at) => Math.sign(at - column) === Math.sign(across))
          .map((at) => ({ row, column: at }))
      : rows.filter((at) => Math.sign(at - row) === down).map((at) => ({ row: at, column }))
  const ways = along.filter(has)
  const isFarthest = !Number.isFinite(across)
  const isBackwards = across < 0 || down < 0
  const next = isBackwards !== isFarthest ? ways.at(-1) : ways[0]
  return next ?? { row, column }
}
