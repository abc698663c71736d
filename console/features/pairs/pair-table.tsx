import { useRowWindow, ROW_HEIGHT } from '#console/lib/row-window.ts'
import { startSentence } from '#console/lib/format.ts'
import { useRowWalk } from '#console/ui/row-walk.ts'
import { useNarrow } from '#console/ui/window-size.ts'
import type { PairRowData } from './pair-filter.ts'
import { PairLines } from './pair-lines.tsx'
import { PairRow, type PairRowParts, type ThemeColumn } from './pair-row.tsx'

export interface PairTableProps extends PairRowParts {
  readonly rows: readonly PairRowData[]
  /** Themes with a column of their own; none where there are too many. */
  readonly columns: readonly ThemeColumn[]
}

/** Every pair with what it measures now. */
export function PairTable(props: PairTableProps) {
  return useNarrow() ? <PairLines {...props} /> : <WideTable {...props} />
}

function WideTable({ rows, columns, ...parts }: PairTableProps) {
  const table = useRowWindow(rows.length)
  const walk = useRowWalk(rows.length, table.reveal)
  const { first, end, before, after } = table.rendered
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger">
      <table aria-rowcount={rows.length + 1} aria-label="Pairs">
        <PairHead columns={columns} />
        {before > 0 && <Spacer rows={before} />}
        <tbody ref={table.firstBody}>
          {rows.slice(first, end).map((row, place) => (
            <PairRow
              key={row.pair.id}
              row={row}
              columns={columns}
              link={walk.rowLink(first + place)}
              {...parts}
            />
          ))}
        </tbody>
        {after > 0 && <Spacer rows={after} />}
      </table>
    </div>
  )
}

function PairHead({ columns }: { columns: readonly ThemeColumn[] }) {
  return (
    <thead>
      <tr aria-rowindex={1}>
        <th>Foreground</th>
        <th className="w-108 @max-[1060px]:hidden">
          <span className="sr-only">Its colours</span>
        </th>
        <th className="w-50 @max-[820px]:hidden">
          <span className="sr-only">Relation</span>
        </th>
        <th>Background</th>
        <th className="w-104 @max-[1060px]:hidden">
          <span className="sr-only">Its colours</span>
        </th>
        <th className="w-112 @max-[940px]:hidden">
          <span className="pl-14">Use</span>
        </th>
        <th className="w-172 @max-[1180px]:hidden">Product, where</th>
        {columns.map(({ key }) => (
          <th key={key} className="w-98 @max-[1240px]:hidden">
            <span className="block truncate pr-52 text-end">{startSentence(key)}</span>
          </th>
        ))}
        <th className={`w-120 ${columns.length > 0 ? '@min-[1240.1px]:hidden' : ''}`}>
          <span className="block pr-58 text-end">Lowest</span>
        </th>
        <th className="w-108">
          <span className="pl-10">Mark</span>
        </th>
      </tr>
    </thead>
  )
}

/** Stands for the rows above or below those that are drawn. */
function Spacer({ rows }: { rows: number }) {
  return (
    <tbody aria-hidden="true">
      <tr>
        <td style={{ height: rows * ROW_HEIGHT }} />
      </tr>
    </tbody>
  )
}
