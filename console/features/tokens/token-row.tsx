import { Link, useNavigate } from 'react-router-dom'
import { RatioRuler } from '#console/ui/ratio-ruler.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import type { RowLinkProps } from '#console/ui/row-walk.ts'
import type { StripBand } from '#console/ui/strip-geometry.ts'
import type { StandingWire } from '#shared/contracts/tokens.contract.ts'
import { type LedgerRow, placeInWords } from './ledger-rows.ts'
import type { StripThemes } from './strip-bands.ts'
import { TokenCell } from './token-cell.tsx'
import { TokenMark } from './token-mark.tsx'
import { TokenSource } from './token-source.tsx'

interface TokenRowProps {
  readonly row: LedgerRow
  /** Rows that the hanging group name spans; 0 where another row carries it. */
  readonly span: number
  readonly shown: StripThemes
  readonly base: string
  readonly breach: StripBand['breach']
  readonly href: string
  readonly link: RowLinkProps
  readonly onLead: (name: string, element: Element) => void
}

export function TokenRow({ row, span, shown, base, breach, href, link, onLead }: TokenRowProps) {
  const navigate = useNavigate()
  const { token, standing } = row
  return (
    <tr
      data-opens
      aria-rowindex={link['data-row'] + 2}
      onClick={(event) => {
        if (!(event.target instanceof HTMLAnchorElement)) void navigate(href)
      }}
    >
      {span > 0 && (
        <th scope="rowgroup" rowSpan={span}>
          <span title={row.group}>{row.group}</span>
        </th>
      )}
      <td className="row-start">
        <Link
          to={href}
          {...link}
          onFocus={(event) => {
            link.onFocus()
            onLead(token.name, event.currentTarget)
          }}
          aria-label={token.name}
          title={token.name}
          className="block truncate py-6 pr-10 font-medium"
        >
          {row.rest}
        </Link>
      </td>
      <td>
        <TokenCell name={token.name} resolved={token.resolved} shown={shown} breach={breach} />
      </td>
      <td className="@max-[960px]:hidden">
        <span className="block truncate pl-14">
          <TokenSource token={token} base={base} />
        </span>
      </td>
      <td className="number figures @max-[760px]:hidden">
        {pairCount(standing)}
        {standing.pairsThroughAliases > 0 && (
          <span className="absolute left-full ml-4 text-ink-soft">
            ({standing.pairsThroughAliases})
          </span>
        )}
      </td>
      <Measures row={row} />
      <td className="whitespace-nowrap">
        <TokenMark row={row} />
      </td>
    </tr>
  )
}

function pairCount(standing: StandingWire): string {
  return standing.pairs === 0 && standing.pairsThroughAliases === 0 ? '–' : String(standing.pairs)
}

function Measures({ row }: { row: LedgerRow }) {
  const { lowest } = row.standing
  const where = placeInWords(row)
  return (
    <>
      <td>
        {lowest !== null && (
          <span className="flex justify-end pr-6">
            <RatioColumns {...lowest} />
          </span>
        )}
        <span className="-mt-3 hidden pr-6 pb-2 text-end text-12 text-ink-soft @max-[700px]:block">
          {where}
        </span>
      </td>
      <td className="@max-[1180px]:hidden">
        <RatioRuler measured={lowest} />
      </td>
      <td className="pr-8! text-ink-soft @max-[700px]:hidden">
        <span className="block leading-18">{where}</span>
      </td>
    </>
  )
}
