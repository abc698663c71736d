import { useWindowVirtualizer } from '@tanstack/react-virtual'
import { type ReactNode, useLayoutEffect, useRef, useState } from 'react'
import { Arrow } from '#console/ui/ratio-text.tsx'
import { StripCell } from '#console/ui/strip-cell.tsx'
import type { ImportChangeWire } from '#shared/contracts/import-outcome.ts'
import type { ChangeCells } from './change-cells.ts'
import { type ChangedMember, changedMembers, changeInWords, changeName } from './change-words.ts'

/** A row where before and after stand; rows of more lines are measured as they are drawn. */
const ROW_HEIGHT = 54
/** Up to here every row is drawn; over it only those near the window. */
const MOST_DRAWN = 150

/** What an import adds, changes and removes, before beside after. */
export function ChangeTable({
  changes,
  cells,
}: {
  changes: readonly ImportChangeWire[]
  cells: ChangeCells
}) {
  const { table, measure, drawn, before, after } = useDrawnRows(changes.length)
  return (
    <div className="ledger mt-12 overflow-x-clip">
      <table ref={table} aria-label="Changes" aria-rowcount={changes.length + 1}>
        <thead>
          <tr>
            <th className="w-[26%] @max-[820px]:w-auto">Item</th>
            <th className="w-148 @max-[820px]:hidden">Before</th>
            <th className="w-136 @max-[820px]:hidden">After</th>
            <th className="@max-[820px]:hidden">What differs</th>
          </tr>
        </thead>
        {before > 0 && <Space height={before} />}
        <tbody>
          {drawn.map((index) => {
            const change = changes[index]
            return (
              change !== undefined && (
                <ChangeRow
                  key={index}
                  index={index}
                  change={change}
                  cells={cells}
                  onDrawn={measure}
                />
              )
            )
          })}
        </tbody>
        {after > 0 && <Space height={after} />}
      </table>
    </div>
  )
}

function useDrawnRows(count: number) {
  const table = useRef<HTMLTableElement>(null)
  const [margin, setMargin] = useState(0)
  const virtualizer = useWindowVirtualizer({
    count,
    estimateSize: () => ROW_HEIGHT,
    overscan: 10,
    scrollMargin: margin,
  })
  useLayoutEffect(() => {
    const head = table.current?.tHead
    if (!table.current || !head) return
    setMargin(table.current.getBoundingClientRect().top + window.scrollY + head.offsetHeight)
  }, [])
  if (count <= MOST_DRAWN) {
    const drawn = Array.from({ length: count }, (_, index) => index)
    return { table, measure: undefined, drawn, before: 0, after: 0 }
  }
  const items = virtualizer.getVirtualItems()
  return {
    table,
    measure: virtualizer.measureElement,
    drawn: items.map(({ index }) => index),
    before: (items[0]?.start ?? margin) - margin,
    after: virtualizer.getTotalSize() - ((items.at(-1)?.end ?? margin) - margin),
  }
}

function Space({ height }: { height: number }) {
  return (
    <tbody aria-hidden="true">
      <tr>
        <td style={{ height }} />
      </tr>
    </tbody>
  )
}

function ChangeRow({
  index,
  change,
  cells,
  onDrawn,
}: {
  index: number
  change: ImportChangeWire
  cells: ChangeCells
  onDrawn: ((row: Element | null) => void) | undefined
}) {
  const seen = {
    before: <SeenCell change={change} side="before" cells={cells} />,
    after: <SeenCell change={change} side="after" cells={cells} />,
  }
  const isSeen = change.colors !== undefined
  const words = <Members change={change} />
  return (
    <tr ref={onDrawn} data-index={index} aria-rowindex={index + 2}>
      <td className="row-start h-54! py-6! pr-16!">
        <span className="block font-medium break-words">{changeName(change)}</span>
        <span className="block text-13 text-ink-soft">{changeInWords(change)}</span>
        {isSeen && (
          <span className="hidden items-center py-6 @max-[820px]:flex">
            {change.before !== undefined && seen.before}
            {change.operation === 'edited' && <Arrow />}
            {change.after !== undefined && seen.after}
          </span>
        )}
        <span className="hidden pb-2 @max-[820px]:block">{words}</span>
      </td>
      <td className="@max-[820px]:hidden">
        <span className="flex items-center">
          {seen.before}
          {isSeen && change.operation === 'edited' && <Arrow />}
        </span>
      </td>
      <td className="@max-[820px]:hidden">{seen.after}</td>
      <td className="py-6! @max-[820px]:hidden">{words}</td>
    </tr>
  )
}

function SeenCell({
  change,
  side,
  cells,
}: {
  change: ImportChangeWire
  side: 'before' | 'after'
  cells: ChangeCells
}): ReactNode {
  const cell = cells.of(change, side)
  if (cell === undefined) return null
  const { light, dark, themes } = cell
  const where = light === dark ? themes.light : `${themes.light} and ${themes.dark}`
  return (
    <StripCell
      size="line"
      light={light}
      dark={dark}
      label={`${changeName(change)} ${side}, in ${where}`}
    />
  )
}

const MOST_MEMBERS = 4

function Members({ change }: { change: ImportChangeWire }) {
  const members = changedMembers(change)
  const rest = members.length - MOST_MEMBERS
  return (
    <span className="figures block text-13">
      {members.slice(0, MOST_MEMBERS).map((member) => (
        <Member key={member.member} {...member} />
      ))}
      {rest > 0 && <span className="block text-ink-soft">and {rest} more</span>}
    </span>
  )
}

function Member({ member, before, after }: ChangedMember) {
  return (
    <span className="flex flex-wrap items-baseline break-words">
      {member !== 'value' && <span className="mr-6 text-ink-soft">{member}</span>}
      {before !== undefined && (
        <span className={after === undefined ? 'line-through' : ''}>{before}</span>
      )}
      {after !== undefined && (
        <span className="inline-flex max-w-full min-w-0 items-baseline">
          {before !== undefined && <Arrow />}
          <span className="min-w-0 break-words">{after}</span>
        </span>
      )}
    </span>
  )
}
