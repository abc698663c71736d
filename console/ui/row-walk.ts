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
      reveal?.(index)
      requestAnimationFrame(() => {
        const link = container.current?.querySelector<HTMLElement>(`[data-row="${index}"]`)
        link?.focus({ preventScroll: true })
        link?.closest('tr, li')?.scrollIntoView({ block: 'nearest' })
      })
    },
    [reveal],
  )

  function onKeyDown(event: KeyboardEvent) {
    const inRow = event.target instanceof HTMLElement && event.target.dataset.row !== undefined
    const next = inRow ? nextRow(event, stop, count) : undefined
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
