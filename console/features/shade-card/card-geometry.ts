/** Chips of a card in px: as LOOK draws them where there is room, narrower where there is not. */
export interface CardGeometry {
  readonly columns: number
  /** From chip to chip. */
  readonly pitch: number
  readonly chip: number
  /** Left of the chips: chroma. */
  readonly labels: number
}

const GAP = 3
export const CHIP_HEIGHT = 23
export const ROW_PITCH = CHIP_HEIGHT + GAP
export const HUE_HEIGHT = 22
const WIDEST_CHIP = 30

/** Columns by the width of the window: fewer where a chip would be too small to be hit. */
export function columnsFor(windowWidth: number): number {
  if (windowWidth < 370) return 7
  return windowWidth <= 720 ? 11 : 21
}

export function cardGeometry(width: number, columns: number): CardGeometry {
  const labels = columns < 21 ? 34 : 40
  const pitch = Math.min(WIDEST_CHIP + GAP, Math.floor((width - labels) / columns))
  return { columns, pitch, chip: pitch - GAP, labels }
}

const NOTCH = { deep: 6.5, half: 5 }
const CORNER = 8

/** The outline of a chip at the origin: notched where it would breach, a corner off where sRGB cannot hold it. */
export function chipOutline({
  width,
  height = CHIP_HEIGHT,
  isNotched,
  isCut,
}: {
  width: number
  height?: number
  isNotched: boolean
  isCut: boolean
}): string {
  const corner = isCut ? `H${width - CORNER}L${width} ${CORNER}` : `H${width}`
  const middle = height / 2
  const notch = isNotched
    ? `V${middle + NOTCH.half}L${NOTCH.deep} ${middle}L0 ${middle - NOTCH.half}`
    : ''
  return `M0 0${corner}V${height}H0${notch}z`
}
