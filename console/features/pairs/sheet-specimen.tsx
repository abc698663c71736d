import { Link } from 'react-router-dom'
import { ratioPosition } from '#console/ui/ratio-scale.ts'
import type { RowLinkProps } from '#console/ui/row-walk.ts'
import { stateInWords, truncateRatio } from '#shared/checks/finding-words.ts'
import type { SheetPoint, SheetWord } from './sheet-bands.ts'
import { captionOf, type PlacedPoint, shapeOf, WORD_SIZES } from './sheet-layout.ts'

/** Words at the place of their ratio, on a writing line drawn from what they need. */
export function SheetSpecimen({
  placed: { point, side },
  isStacked,
  pairHref,
  linkOf,
}: {
  placed: PlacedPoint
  isStacked: boolean
  pairHref: (id: string) => string
  linkOf: (place: number) => RowLinkProps
}) {
  const [word] = point.words
  const place = ratioPosition(point.ratio, 100)
  const across =
    side === 'right' ? { left: `calc(${place}% + 6px)` } : { right: `calc(${100 - place}% + 6px)` }
  return (
    <li>
      {point.required > 0 && <WritingLine point={point} />}
      <span
        aria-hidden="true"
        className="absolute top-8 bottom-2 -ml-1 w-3"
        style={{ left: `${place}%`, backgroundColor: word?.color }}
      />
      <span
        className={`absolute top-4 bottom-4 flex items-center whitespace-nowrap ${isStacked ? 'flex-wrap content-start' : ''} ${side === 'left' ? 'justify-end' : ''}`}
        style={across}
      >
        {point.words.map((each, at) => (
          <Word
            key={`${each.foreground} ${each.finding.identity}`}
            word={each}
            href={pairHref(each.pair)}
            link={linkOf(at)}
          />
        ))}
        <span data-ratio className="figures sheet-written px-2 text-13 font-semibold">
          {truncateRatio(point.ratio, 2)}
        </span>
        <Caption point={point} isStacked={isStacked} />
      </span>
    </li>
  )
}

/** From the required line to the point; bold where that is what is missing. */
function WritingLine({ point }: { point: SheetPoint }) {
  const [from, to] = [point.required, point.ratio].map((ratio) => ratioPosition(ratio, 100)) as [
    number,
    number,
  ]
  return (
    <span
      aria-hidden="true"
      className={`absolute bottom-2 ${point.isShort ? 'h-[2.5px] border-r-3' : 'h-1 opacity-70'} bg-current`}
      style={{ left: `${Math.min(from, to)}%`, width: `${Math.abs(to - from)}%` }}
    />
  )
}

function Word({ word, href, link }: { word: SheetWord; href: string; link: RowLinkProps }) {
  const shape = shapeOf(word)
  const { size, weight } = WORD_SIZES[shape]
  return (
    <Link to={href} {...link} aria-label={labelOf(word)} className="sheet-word">
      {shape === 'bar' ? (
        <span
          aria-hidden="true"
          className="block h-12 w-26"
          style={{ backgroundColor: word.color }}
        />
      ) : (
        // A picture of somebody's colours, short of their line or not: what is to be read is the link's name.
        <span
          aria-hidden="true"
          data-specimen={word.text}
          className={shape === 'link-in-text' ? 'underline' : ''}
          style={{ color: word.color, fontSize: size, fontWeight: weight }}
        />
      )}
      <span aria-hidden="true" className="sheet-name">
        {nameOf(word)}
      </span>
    </Link>
  )
}

function stateOf({ finding }: SheetWord): string {
  return stateInWords(`${finding.foregroundState}/${finding.backgroundState}`)
}

/** The token's name, and its states where the two sides differ. */
function nameOf(word: SheetWord): string {
  const { foregroundState, backgroundState } = word.finding
  return foregroundState === backgroundState
    ? word.foreground
    : `${word.foreground}, ${stateOf(word)}`
}

function labelOf(word: SheetWord): string {
  const { ratio, required, outcome } = word.finding
  const needs = outcome === 'exempt' || required === 0 ? '' : ` of ${required}`
  const said = outcome === 'pass' ? '' : `, ${outcome === 'known' ? 'breach' : outcome}`
  return `${word.foreground}, ${stateOf(word)}, ${truncateRatio(ratio, 2)}${needs}${said}`
}

function Caption({ point, isStacked }: { point: SheetPoint; isStacked: boolean }) {
  const caption = captionOf(point)
  if (caption === '') return null
  return (
    <span
      className={`inline-flex items-center gap-x-6 text-13 ${point.isShort ? 'font-medium' : ''} sheet-written ${isStacked ? 'w-full whitespace-normal' : 'pl-6'}`}
    >
      {point.outcome !== 'pass' && <CaptionMark outcome={point.outcome} />}
      {caption}
    </span>
  )
}

/** The marks in the note colour of the band: their own may not be seen on it. */
function CaptionMark({ outcome }: Pick<SheetPoint, 'outcome'>) {
  return (
    <svg
      viewBox="0 0 12 12"
      width="12"
      height="12"
      aria-hidden="true"
      className="shrink-0 overflow-visible"
    >
      {outcome === 'breach' || outcome === 'known' ? (
        <path d="M0 0h12v12H0v-2L5.5 6 0 2z" fill="currentColor" />
      ) : (
        <circle
          cx="6"
          cy="6"
          r="5"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.6"
          strokeDasharray={outcome === 'waived' ? '2.35 1.577' : undefined}
        />
      )}
    </svg>
  )
}
