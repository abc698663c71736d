import type { CSSProperties } from 'react'
import { Link } from 'react-router-dom'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { RATIO_LINES, ratioPosition } from '#console/ui/ratio-scale.ts'
import type { RowLinkProps } from '#console/ui/row-walk.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { SheetBand as Band, SheetPoint } from './sheet-bands.ts'
import type { SheetLine } from './sheet-layout.ts'
import { SheetSpecimen } from './sheet-specimen.tsx'

export interface SheetBandProps {
  readonly band: Band
  readonly lines: readonly SheetLine[]
  readonly isStacked: boolean
  readonly tokenHref: (name: string) => string
  readonly pairHref: (id: string) => string
  /** The link props of the word at a place among the band's words. */
  readonly linkOf: (at: number) => RowLinkProps
}

/** A background in its real colour, and on it everything that is declared to stand there. */
export function SheetBand(props: SheetBandProps) {
  const { band, lines, tokenHref } = props
  let at = 0
  return (
    <section aria-label={`On ${band.background}`} className="sheet-band">
      <div className="min-w-0 pt-8 wide:pr-16">
        <h2 className="font-medium break-words">
          <Link to={tokenHref(band.background)} className="hover:underline">
            {band.background}
          </Link>
        </h2>
        <p className="text-13 text-ink-soft">
          <span className="figures">{band.color}</span>
          <span className="ml-12">{countOf(band.pairs, 'pair')}</span>
        </p>
        <Under backdrop={band.backdrop} />
        {band.breaches > 0 && (
          <p className="text-13">
            <OutcomeMark kind="breach">{countOf(band.breaches, 'breach', 'breaches')}</OutcomeMark>
          </p>
        )}
      </div>
      <div
        className="own-colors sheet-cloth"
        style={{ ...bandColor(band.color), backgroundColor: band.color, color: band.note }}
      >
        {RATIO_LINES.map((line) => (
          <span
            key={line}
            aria-hidden="true"
            className="sheet-line"
            style={{ left: at100(line) }}
          />
        ))}
        {band.points
          .filter(({ isShort }) => isShort)
          .map((point) => (
            <Notch key={point.key} point={point} />
          ))}
        {lines.map((line) => (
          <ul
            key={line.points.map(({ point }) => point.key).join()}
            className="relative"
            style={{ height: line.height }}
          >
            {line.points.map((placed) => {
              const first = at
              at += placed.point.words.length
              return (
                <SheetSpecimen
                  key={placed.point.key}
                  placed={placed}
                  isStacked={props.isStacked}
                  pairHref={props.pairHref}
                  linkOf={(place) => props.linkOf(first + place)}
                />
              )
            })}
          </ul>
        ))}
      </div>
    </section>
  )
}

/** What words on the band stand on, for the style sheet. */
const bandColor = (color: string) => ({ '--band': color }) as CSSProperties

const at100 = (ratio: number) => `${ratioPosition(ratio, 100)}%`

function Under({ backdrop }: Pick<Band, 'backdrop'>) {
  if (backdrop === 'unknown') {
    return <p className="text-13 text-ink-soft">on what nobody knows; shown on the ground</p>
  }
  return backdrop.length === 0 ? null : (
    <p className="text-13 break-words text-ink-soft">on {backdrop.join(', on ')}</p>
  )
}

/** A V cut into the top edge over a point that falls short, and a stitch outside it. */
function Notch({ point }: { point: SheetPoint }) {
  const isBreach = point.outcome === 'breach' || point.outcome === 'known'
  return (
    <svg
      viewBox="-8 -10 16 20"
      width="16"
      height="20"
      aria-hidden="true"
      className="absolute -top-10 -ml-8 overflow-visible"
      style={{ left: at100(point.ratio) }}
    >
      <path d="M-8 -1L0 9L8 -1z" className="fill-ground" />
      <path d="M-8 0L0 9L8 0" fill="none" stroke="currentColor" strokeOpacity="0.6" />
      {isBreach && <rect x={-2} y={-9} width={4} height={7} className="mark-shape fill-madder" />}
    </svg>
  )
}
