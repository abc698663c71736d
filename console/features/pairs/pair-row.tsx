import type { ReactNode } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { lowestFinding } from '#console/lib/lowest-finding.ts'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import type { RowLinkProps } from '#console/ui/row-walk.ts'
import type { Finding } from '#shared/checks/model.ts'
import type { PairRowData } from './pair-filter.ts'
import { PairMark } from './pair-mark.tsx'
import { pairTitle, statesInWords, themesInWords, wordsOfUse } from './pair-words.ts'

/** A theme that has a column. */
export interface ThemeColumn {
  readonly id: string
  readonly key: string
}

export interface PairRowParts {
  readonly href: (id: string) => string
  /** How a token of a pair looks, lying down; cut where the pair itself breaches. */
  readonly cellOf: (token: string, findings: readonly Finding[] | undefined) => ReactNode
  /** Where a finding is measured, in words. */
  readonly whereOf: (finding: Finding) => string
  /** The row took focus: the strip's leader runs to it. */
  readonly onLead: (token: string, element: Element) => void
}

export function PairRow({
  row,
  columns,
  link,
  href,
  cellOf,
  whereOf,
  onLead,
}: PairRowParts & {
  row: PairRowData
  columns: readonly ThemeColumn[]
  link: RowLinkProps
}) {
  const navigate = useNavigate()
  const { pair, lowest, findings } = row
  return (
    <tr
      data-opens
      aria-rowindex={link['data-row'] + 2}
      onClick={(event) => {
        if (!(event.target instanceof HTMLAnchorElement)) void navigate(href(pair.id))
      }}
    >
      <td className="row-start">
        <Link
          to={href(pair.id)}
          {...link}
          onFocus={(event) => {
            link.onFocus()
            onLead(pair.foreground, event.currentTarget)
          }}
          aria-label={`${pairTitle(pair)}, ${pair.use}`}
          title={pair.foreground}
          className="block truncate py-6 pr-10 font-medium"
        >
          {pair.foreground}
        </Link>
      </td>
      <td className="@max-[1060px]:hidden">{cellOf(pair.foreground, findings)}</td>
      <td className="pl-8! text-ink-soft @max-[820px]:hidden">
        {pair.relation === 'inside' ? 'inside' : 'with'}
      </td>
      <td>
        <span title={pair.background} className="block truncate pr-10">
          {pair.background}
        </span>
      </td>
      <td className="@max-[1060px]:hidden">{cellOf(pair.background, findings)}</td>
      <td className="@max-[940px]:hidden">
        <span className="block truncate pr-8 pl-14">{wordsOfUse(pair.use)}</span>
      </td>
      <td className="@max-[1180px]:hidden">
        <Where row={row} />
      </td>
      {columns.map(({ id, key }) => (
        <td key={key} data-theme-column={key} className="@max-[1240px]:hidden">
          <ThemeRatio findings={row.findings?.filter(({ theme }) => theme === id)} />
        </td>
      ))}
      <td className={columns.length > 0 ? '@min-[1240.1px]:hidden' : ''}>
        {lowest !== undefined && (
          <span className="flex justify-end pr-6">
            <RatioColumns {...lowest} />
          </span>
        )}
        {lowest !== undefined && (
          <span className="-mt-3 block truncate pr-6 text-end text-12 text-ink-soft">
            {whereOf(lowest)}
          </span>
        )}
      </td>
      <td className="whitespace-nowrap">
        <span className="pl-10">
          <PairMark row={row} />
        </span>
      </td>
    </tr>
  )
}

function Where({ row: { pair } }: { row: PairRowData }) {
  const places = `${themesInWords(pair.themes)}, ${statesInWords(pair.states)}`
  return (
    <span className="block pr-10 text-13 leading-16 text-ink-soft">
      <span className="block truncate text-ink">{pair.product ?? 'no product'}</span>
      <span title={places} className="block truncate text-12">
        {places}
      </span>
    </span>
  )
}

function ThemeRatio({ findings }: { findings: readonly Finding[] | undefined }) {
  const lowest = findings && lowestFinding(findings)
  return (
    <span className="flex justify-end">
      {lowest === undefined ? (
        <span className="pr-52 text-ink-soft">{findings === undefined ? '' : '–'}</span>
      ) : (
        <RatioColumns {...lowest} />
      )}
    </span>
  )
}
