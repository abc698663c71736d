import { useEffect } from 'react'
import { startSentence } from '#console/lib/format.ts'
import { RulerHead } from '#console/ui/ratio-ruler.tsx'
import type { StripBand } from '#console/ui/strip-geometry.ts'
import { useRowWalk } from '#console/ui/row-walk.ts'
import { useNarrow } from '#console/ui/window-size.ts'
import { groupRows, type LedgerRow } from './ledger-rows.ts'
import type { StripThemes } from './strip-bands.ts'
import { TokenLines } from './token-lines.tsx'
import { TokenRow } from './token-row.tsx'
import { SourceHeads } from './token-source.tsx'
import { ROW_HEIGHT, useRowWindow } from '#console/lib/row-window.ts'

export interface TokenLedgerProps {
  readonly rows: readonly LedgerRow[]
  readonly shown: StripThemes
  readonly base: string
  readonly breaches: ReadonlyMap<string, StripBand['breach']>
  readonly href: (name: string) => string
  /** A row took focus: the strip's leader runs to it. */
  readonly onLead: (name: string, element: Element) => void
  /** The first and last row in the window, or none. */
  readonly onView: (view: readonly [string, string] | undefined) => void
}

export function TokenLedger(props: TokenLedgerProps) {
  return useNarrow() ? <TokenLines {...props} /> : <TokenTable {...props} />
}

function TokenTable({ rows, shown, base, breaches, href, onLead, onView }: TokenLedgerProps) {
  const table = useRowWindow(rows.length)
  const walk = useRowWalk(rows.length, table.reveal)
  const { first, end, before, after } = table.rendered
  const [from, to] = table.inView
  useEffect(() => {
    const names = [rows[from]?.token.name, rows[to]?.token.name] as const
    onView(names[0] === undefined || names[1] === undefined ? undefined : [names[0], names[1]])
  }, [rows, from, to, onView])
  let index = first
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger [--row-from:88px]">
      <table aria-rowcount={rows.length + 1} aria-label="Tokens">
        <LedgerHead light={shown.light} dark={shown.dark} />
        {before > 0 && <Spacer rows={before} />}
        {groupRows(rows.slice(first, end)).map((group) => (
          <tbody key={group.name + index} ref={index === first ? table.firstBody : undefined}>
            {group.rows.map((row, place) => (
              <TokenRow
                key={row.token.id}
                row={row}
                span={place === 0 ? group.rows.length : 0}
                shown={shown}
                base={base}
                breach={breaches.get(row.token.name)}
                href={href(row.token.name)}
                link={walk.rowLink(index++)}
                onLead={onLead}
              />
            ))}
          </tbody>
        ))}
        {after > 0 && <Spacer rows={after} />}
      </table>
    </div>
  )
}

function LedgerHead({ light, dark }: { light: string; dark: string }) {
  return (
    <thead>
      <tr aria-rowindex={1}>
        <th className="w-88">Group</th>
        <th className="w-[max(120px,156px+(100cqw-1280px)*0.5)]">Name</th>
        <th className="w-128">{startSentence(light === dark ? light : `${light}, ${dark}`)}</th>
        <th className="w-194 @max-[960px]:hidden">
          <span className="pl-14 inline-block">
            <SourceHeads />
          </span>
        </th>
        <th className="number w-52 @max-[760px]:hidden">Pairs</th>
        <th className="w-129">
          <span className="block w-71 text-end">Lowest</span>
        </th>
        <th className="w-257 @max-[1180px]:hidden">
          <span className="sr-only">Ratio, from 1 to 21</span>
          <RulerHead />
        </th>
        <th className="w-[max(104px,146px+(100cqw-1280px)*0.2)] @max-[700px]:hidden">Where</th>
        <th>Mark</th>
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
