import { type KeyboardEvent, useCallback, useRef, useState } from 'react'

/** What a row's link needs to take part in the walk. */
export interface RowLinkProps {
  readonly 'data-row': number
  readonly tabIndex: 0 | -1
  readonly onFocus: () => void
}

/**
 * One tab stop for a whole table: the arrows walk the rows, Home and End go to its ends. Enter is the link's own.
 * `reveal` brings a row into the document where rows are virtual.
 */
export function useRowWalk(count: number, reveal?: (index: number) => void) {
  const container = useRef<HTMLDivElement>(null)
  const [current, setCurrent] = useState(0)
  const stop = Math.max(0, Math.min(current, count - 1))

  const focusRow = useCallback(
    (index: number) => {
      const find = () => container.current?.querySelector<HTMLElement>(`[data-row="${index}"]`)
      const take = (link: HTMLElement | null | undefined) => {
        link?.focus({ preventScroll: true })
        link?.closest('tr, li')?.scrollIntoView({ block: 'nearest' })
      }
      const drawn = find()
      if (drawn) return take(drawn)
      reveal?.(index)
      requestAnimationFrame(() => take(find()))
    },
    [reveal],
  )

  function onKeyDown(event: KeyboardEvent) {
    if (!(event.target instanceof HTMLElement) || event.target.dataset.row === undefined) return
    const next = nextRow(event, Number(event.target.dataset.row), count)
    if (next === undefined) return
    event.preventDefault()
    focusRow(next)
  }

  function rowLink(index: number): RowLinkProps {
    return {
      'data-row': index,
      tabIndex: index === stop ? 0 : -1,
      onFocus: () => setCurrent(index),
    }
  }

  return { container, onKeyDown, rowLink, stop }
}

const PAGE = 12

function nextRow(event: KeyboardEvent, from: number, count: number): number | undefined {
  if (event.altKey || event.ctrlKey || event.metaKey) return undefined
  const steps: Record<string, number> = {
    ArrowDown: from + 1,
    ArrowUp: from - 1,
    PageDown: from + PAGE,
    PageUp: from - PAGE,
    Home: 0,
    End: count - 1,
  }
  const next = steps[event.key]
  return next === undefined ? undefined : Math.max(0, Math.min(next, count - 1))
}
