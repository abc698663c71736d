import { Link } from 'react-router-dom'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { useRowWalk } from '#console/ui/row-walk.ts'
import { PairMark } from './pair-mark.tsx'
import type { PairTableProps } from './pair-table.tsx'
import { pairTitle } from './pair-words.ts'

/** The pairs of a narrow screen, two lines each. */
export function PairLines({ rows, href, whereOf, onLead }: PairTableProps) {
  const walk = useRowWalk(rows.length)
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown}>
      <ul aria-label="Pairs" className="ledger-lines border-t-3 border-double border-ink">
        {rows.map((row, index) => {
          const { pair, lowest } = row
          const link = walk.rowLink(index)
          return (
            <li key={pair.id}>
              <div className="flex items-baseline justify-between gap-12 pt-8">
                <Link
                  to={href(pair.id)}
                  {...link}
                  onFocus={(event) => {
                    link.onFocus()
                    onLead(pair.foreground, event.currentTarget)
                  }}
                  aria-label={`${pairTitle(pair)}, ${pair.use}`}
                  className="min-w-0 break-words"
                >
                  <span className="font-medium">{pair.foreground}</span> on {pair.background}
                </Link>
                <span className="shrink-0">
                  <PairMark row={row} />
                </span>
              </div>
              {lowest !== undefined && (
                <div className="line-measures py-6">
                  <PairSample {...lowest.rendered} breaches={lowest.outcome === 'breach'} />
                  <RatioColumns {...lowest} />
                  <span className="line-where">{whereOf(lowest)}</span>
                </div>
              )}
            </li>
          )
        })}
      </ul>
    </div>
  )
}
