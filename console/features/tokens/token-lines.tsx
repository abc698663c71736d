import { Link } from 'react-router-dom'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { type RowLinkProps, useRowWalk } from '#console/ui/row-walk.ts'
import { groupRows, type LedgerRow, placeInWords } from './ledger-rows.ts'
import { TokenCell } from './token-cell.tsx'
import type { TokenLedgerProps } from './token-ledger.tsx'
import { TokenMark } from './token-mark.tsx'

/** The ledger of a narrow screen: two lines a token, the group as a heading. */
export function TokenLines(props: TokenLedgerProps) {
  const { rows } = props
  const walk = useRowWalk(rows.length)
  let index = 0
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the links inside, which are operable
    <div
      ref={walk.container}
      onKeyDown={walk.onKeyDown}
      className="border-t-3 border-double border-ink"
    >
      {groupRows(rows).map((group) => (
        <section key={group.name + index} aria-label={group.name}>
          <h2 className="sticky top-0 z-1 bg-ground pt-14 pb-6 font-semibold">{group.name}</h2>
          <ul className="ledger-lines">
            {group.rows.map((row) => (
              <TokenLine key={row.token.id} {...props} row={row} link={walk.rowLink(index++)} />
            ))}
          </ul>
        </section>
      ))}
    </div>
  )
}

function TokenLine({
  row,
  link,
  shown,
  breaches,
  href,
}: TokenLedgerProps & { row: LedgerRow; link: RowLinkProps }) {
  const { token, standing } = row
  const { lowest } = standing
  return (
    <li>
      <div className="flex items-baseline justify-between gap-12 pt-8">
        <Link
          to={href(token.name)}
          {...link}
          aria-label={token.name}
          className="min-w-0 truncate font-medium"
        >
          {row.rest}
        </Link>
        <span className="shrink-0">
          <TokenMark row={row} />
        </span>
      </div>
      <div className="line-measures py-6">
        <TokenCell
          name={token.name}
          resolved={token.resolved}
          shown={shown}
          breach={breaches.get(token.name)}
          size="line"
        />
        {lowest !== null && <RatioColumns {...lowest} />}
        <span className="line-where">{placeInWords(row)}</span>
      </div>
    </li>
  )
}
