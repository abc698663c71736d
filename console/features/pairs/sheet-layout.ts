import type { SheetPoint, SheetWord } from './sheet-bands.ts'

/** A point where it stands: its words run to the right of it, or to the left where they would leave the sheet. */
export interface PlacedPoint {
  readonly point: SheetPoint
  readonly side: 'right' | 'left'
}

/** One line of a band, top to bottom. */
export interface SheetLine {
  readonly points: readonly PlacedPoint[]
  /** px. */
  readonly height: number
}

export interface SheetRoom {
  /** Width of the ruler, px. */
  readonly width: number
  /** Where a ratio stands on it, px. */
  readonly placeOf: (ratio: number) => number
  /** Whether every word has its token's name beside it. */
  readonly hasNames: boolean
  /** Whether what is said of a breach stands under the word, for want of width. */
  readonly isStacked: boolean
}

export const WORD_SIZES = {
  text: { size: 16, weight: 400 },
  'large-text': { size: 24, weight: 400 },
  'link-in-text': { size: 16, weight: 400 },
  bar: { size: 26, weight: 400 },
} as const

const LINE = 31
const LARGE_LINE = 40
const STACKED = 18
/** Between a point and its words, and between words. */
export const WORD_GAP = 8

/** How a use is shown: as a word of some size, or as a bar. */
export function shapeOf({ use }: Pick<SheetWord, 'use'>): keyof typeof WORD_SIZES {
  return use === 'text' || use === 'large-text' || use === 'link-in-text' ? use : 'bar'
}

/** On the safe side of what Inter takes: a little over its average advance. */
const ADVANCE = 0.6

const textWidth = (text: string, size: number) => text.length * size * ADVANCE

function wordWidth(word: SheetWord, { hasNames }: SheetRoom): number {
  const shape = shapeOf(word)
  const own = shape === 'bar' ? 26 : textWidth(word.text, WORD_SIZES[shape].size)
  return own + WORD_GAP + (hasNames ? textWidth(word.foreground, 12) + WORD_GAP : 0)
}

/** The words that stand beside the figure: what is wrong with it, or why it may be. */
export function captionOf({ outcome, ratio, required, words }: SheetPoint): string {
  const names = words.map(({ foreground }) => foreground).join(', ')
  if (outcome === 'breach' || outcome === 'known') {
    return `breach, ${names} ${words.length === 1 ? 'needs' : 'need'} ${required}`
  }
  if (outcome === 'waived') return `waived, ${names}`
  if (outcome === 'exempt') return 'exempt'
  return ratio < required ? 'its group passes' : ''
}

function pointWidth(point: SheetPoint, room: SheetRoom): number {
  const words = point.words.reduce((sum, word) => sum + wordWidth(word, room), 0)
  const caption = captionOf(point)
  const captionWidth = caption === '' ? 0 : textWidth(caption, 13) + 30
  return room.isStacked ? Math.max(words + 40, captionWidth) : words + 40 + captionWidth + WORD_GAP
}

interface Draft {
  readonly points: PlacedPoint[]
  readonly taken: (readonly [from: number, to: number])[]
  height: number
}

/** Lays points out in lines so that no words lie over others; short ones have the first lines to themselves. */
export function sheetLines(points: readonly SheetPoint[], room: SheetRoom): SheetLine[] {
  const lines: Draft[] = []
  let firstShared = 0
  for (const point of points.flatMap((each) => fitting(each, room))) {
    const { side, from, to } = placed(point, room)
    const isFree = ({ taken }: Draft) => taken.every(([start, end]) => to < start || end < from)
    const shared = point.isShort ? undefined : lines.slice(firstShared).find(isFree)
    const line = shared ?? { points: [], taken: [], height: 0 }
    if (shared === undefined) lines.push(line)
    if (point.isShort) firstShared = lines.length
    line.points.push({ point, side })
    line.taken.push([from, to])
    line.height = Math.max(line.height, heightOf(point, room))
  }
  return lines.map(({ points: on, height }) => ({ points: on, height }))
}

/** A point, or where its words together find no room on either side each word by itself. */
function fitting(point: SheetPoint, room: SheetRoom): SheetPoint[] {
  const x = room.placeOf(point.ratio)
  const isFitting = pointWidth(point, room) <= Math.max(x, room.width - x) - WORD_GAP
  if (isFitting || point.words.length === 1) return [point]
  return point.words.map((word) => ({
    ...point,
    key: `${point.key} ${word.foreground} ${word.finding.identity}`,
    words: [word],
  }))
}

function placed(point: SheetPoint, room: SheetRoom) {
  const x = room.placeOf(point.ratio)
  const width = pointWidth(point, room) + WORD_GAP
  const isRight = x + width <= room.width || x < room.width / 2
  return isRight
    ? { side: 'right' as const, from: x - 3, to: x + width }
    : { side: 'left' as const, from: x - width, to: x + 3 }
}

function heightOf(point: SheetPoint, { isStacked }: SheetRoom): number {
  const line = point.words.some((word) => shapeOf(word) === 'large-text') ? LARGE_LINE : LINE
  return isStacked && captionOf(point) !== '' ? line + STACKED : line
}
