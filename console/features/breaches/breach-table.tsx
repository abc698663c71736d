import { Fragment, type ReactNode } from 'react'
import { useRowWalk } from '#console/ui/row-walk.ts'
import { useNarrow, useWindowWidth } from '#console/ui/window-size.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { type BreachColumns, breachColumns } from './breach-columns.ts'
import { BreachLine } from './breach-line.tsx'
import { BreachRow } from './breach-row.tsx'

export interface BreachTableProps {
  readonly breaches: readonly BreachWire[]
  /** Id of the opened one. */
  readonly opened: string | undefined
  /** What stands under the opened row. */
  readonly under: ReactNode
  readonly href: (breach: BreachWire) => string
}

/** The breach log; one breach may be opened, its history under its row. */
export function BreachTable(props: BreachTableProps) {
  const { breaches, opened, under, href } = props
  const walk = useRowWalk(breaches.length)
  const narrow = useNarrow()
  const columns = breachColumns(
    useWindowWidth(),
    breaches.some(({ assignee }) => assignee !== null),
  )
  const rows = breaches.map((breach, index) => ({
    breach,
    href: href(breach),
    link: walk.rowLink(index),
    isOpened: breach.id === opened,
  }))
  if (narrow) {
    return (
      // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
      <div ref={walk.container} onKeyDown={walk.onKeyDown}>
        <ul className="ledger-lines border-t-3 border-double border-ink">
          {rows.map((row) => (
            <BreachLine key={row.breach.id} {...row} under={under} />
          ))}
        </ul>
      </div>
    )
  }
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger">
      <table aria-label="Breaches">
        <BreachHead columns={columns} />
        <tbody>
          {rows.map((row) => (
            <Fragment key={row.breach.id}>
              <BreachRow {...row} columns={columns} />
              {row.isOpened && (
                <tr data-under>
                  <td colSpan={columns.count}>{under}</td>
                </tr>
              )}
            </Fragment>
          ))}
        </tbody>
      </table>
    </div>
  )
}

function BreachHead({ columns }: { columns: BreachColumns }) {
  return (
    <thead>
      <tr>
        <th className="number w-30">No.</th>
        <th className="w-124">
          <span className="pl-16">Seen as</span>
        </th>
        <th>Pair</th>
        {columns.where && <th className="w-[max(130px,15cqw)]">Where</th>}
        <th className="w-122">
          <span className="block w-64 text-end">Ratio</span>
        </th>
        {columns.firstSeen && (
          <th className="w-150">
            <span className="pl-16">First seen</span>
          </th>
        )}
        <th className="w-[max(120px,15cqw)]">Status</th>
        {columns.assignee && <th className="w-130">With</th>}
      </tr>
    </thead>
  )
}
