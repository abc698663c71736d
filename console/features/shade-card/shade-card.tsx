import { type ReactNode, useMemo, useRef } from 'react'
import { formatHue } from '#console/lib/format.ts'
import { useElementWidth } from '#console/ui/element-width.ts'
import type { ProbedBreach } from '#shared/checks/color-probe.ts'
import { CardChips } from './card-chips.tsx'
import { type CardChip, type CutCard, isWhole, nearestRun, type WholeRun } from './card-cut.ts'
import { CardDrawing, type Ring } from './card-drawing.tsx'
import { type CardGeometry, cardGeometry, chipOutline } from './card-geometry.ts'

export interface ShadeCardProps {
  readonly card: CutCard
  /** Whether the middle is the present colour: not where the card is cut at another hue. */
  readonly isPresentHue: boolean
  readonly tried: string | undefined
  readonly looked: CardChip | undefined
  /** `on surface.night`: what a breach is with. */
  readonly withOf: (breach: ProbedBreach) => string
  /** `light, rest` */
  readonly whereOf: (breach: ProbedBreach) => string
  readonly onTry: (chip: CardChip, isHue: boolean) => void
  readonly onLook: (chip: CardChip | undefined) => void
  /** What is said of the chip under the pointer or the focus. */
  readonly children: ReactNode
}

/** A card of dyed chips: the allowed shades as a shape, before anything is tried. */
export function ShadeCard(props: ShadeCardProps) {
  const { card, isPresentHue, tried, withOf, whereOf } = props
  const frame = useRef<HTMLDivElement>(null)
  const width = useElementWidth(frame, 733)
  const columns = card.grid.lightness.length
  const geometry = useMemo(() => cardGeometry(width, columns), [width, columns])
  const run = useMemo(() => nearestRun(card.rows, card.grid.center), [card])
  const rings = useMemo(() => ringsOf(card, isPresentHue, tried), [card, isPresentHue, tried])
  const nameOf = useMemo(
    () => (chip: CardChip) => chipInWords(chip, { withOf, whereOf }),
    [withOf, whereOf],
  )
  return (
    <div ref={frame} className="min-w-0">
      <div className="relative">
        <CardDrawing card={card} geometry={geometry} rings={rings} run={run} />
        <CardChips
          card={card}
          geometry={geometry}
          nameOf={nameOf}
          tried={tried}
          onTry={props.onTry}
          onLook={props.onLook}
        />
      </div>
      <Limits
        run={run}
        geometry={geometry}
        isCut={card.rows.length === card.grid.chroma.length}
        {...props}
      />
      <Legend />
      {props.children}
    </div>
  )
}

function ringsOf(card: CutCard, isPresentHue: boolean, tried: string | undefined): Ring[] {
  const { center } = card.grid
  const present: Ring[] = isPresentHue
    ? [
        { row: -1, column: center.column, kind: 'present' },
        { ...center, kind: 'present' },
      ]
    : []
  if (tried === undefined) return present
  const row = card.rows.findIndex((chips) => chips.some((chip) => chip?.css === tried))
  const column = card.rows[row]?.findIndex((chip) => chip?.css === tried) ?? -1
  return column < 0 ? present : [...present, { row, column, kind: 'tried' }]
}

const GAMUT_WORDS = { srgb: '', p3: ', outside sRGB', beyond: ', outside Display P3' } as const

/** What a chip is and comes to, as one name. */
function chipInWords(
  chip: CardChip,
  { withOf, whereOf }: Pick<ShadeCardProps, 'withOf' | 'whereOf'>,
): string {
  const start = `${chip.css}, ${chip.hex}${GAMUT_WORDS[chip.gamut]}`
  const [breach] = chip.breaches
  if (chip.outcome === 'refused') return `${start}, cannot be resolved`
  if (isWhole(chip) || breach === undefined) return `${start}, passes all its pairs`
  return `${start}, would breach ${withOf(breach)}, ${whereOf(breach)}`
}

/** What ends the allowed shape where the present colour stands. */
function Limits({
  run,
  geometry,
  isCut,
  withOf,
  whereOf,
}: Pick<ShadeCardProps, 'withOf' | 'whereOf'> & {
  run: WholeRun | undefined
  geometry: CardGeometry
  isCut: boolean
}) {
  if (run === undefined) {
    return (
      <p className="mt-6 text-13">
        {isCut ? 'No shade on this card passes all its pairs.' : 'Cutting the card'}
      </p>
    )
  }
  const { labels, pitch } = geometry
  const limits = [
    { side: 'darker', limit: run.darker, at: labels + run.from * pitch - 12 },
    { side: 'lighter', limit: run.lighter, at: labels + (run.to + 1) * pitch + 10 },
  ] as const
  const right = labels + geometry.columns * pitch
  return (
    <ul aria-label="Limits" className="-mt-4 text-13">
      {limits.map(
        ({ side, limit, at }) =>
          limit !== undefined && (
            <li
              key={side}
              className={side === 'darker' && at >= LIMIT_WIDTH ? 'text-end' : ''}
              style={limitPlace(side, at, right)}
            >
              {side} breaches <span className="font-medium">{withOf(limit.breach)}</span>,{' '}
              {whereOf(limit.breach)}, needs {limit.breach.finding.required}
            </li>
          ),
      )}
    </ul>
  )
}

/** What the words of a limit take, px: with less they stand at the margin. */
const LIMIT_WIDTH = 300

/** Words stand beside the tick that they explain. */
function limitPlace(side: 'darker' | 'lighter', at: number, right: number) {
  if (side === 'darker') return at >= LIMIT_WIDTH ? { width: at } : undefined
  return right - at >= LIMIT_WIDTH ? { paddingLeft: at } : undefined
}

const KEYS = [
  ['passes all its pairs', { isNotched: false, isCut: false }],
  ['would breach', { isNotched: true, isCut: false }],
  ['outside sRGB', { isNotched: false, isCut: true }],
] as const

function Legend() {
  return (
    <ul
      aria-label="Marks of the card"
      className="mt-12 flex flex-wrap gap-x-22 gap-y-6 border-t border-feint pt-10 text-13 text-ink-soft"
    >
      {KEYS.map(([text, marks]) => (
        <li key={text} className="flex items-center gap-x-8">
          <svg viewBox="0 0 20 14" width="20" height="14" aria-hidden="true">
            <path d={chipOutline({ width: 20, height: 14, ...marks })} className="fill-ink-soft" />
          </svg>
          {text}
        </li>
      ))}
      <li className="flex items-center gap-x-8">
        <span aria-hidden="true" className="h-14 w-20 border-2 border-ink" />
        present
      </li>
      <li className="flex items-center gap-x-8">
        <span aria-hidden="true" className="h-14 w-20 border-3 border-woad" />
        tried
      </li>
    </ul>
  )
}

/** `lightness across, chroma down, at hue 243°` */
export function cardInWords({ grid }: CutCard): string {
  return `lightness across, chroma down, at hue ${formatHue(grid.hueDegrees)}`
}
