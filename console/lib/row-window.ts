import { useWindowVirtualizer } from '@tanstack/react-virtual'
import { useCallback, useLayoutEffect, useRef, useState } from 'react'
import { useWindowHeight } from '#console/ui/window-size.ts'

export const ROW_HEIGHT = 38

/** Up to here every row is drawn; over it only those near the window. */
const MOST_DRAWN = 150

/** Which rows of the table are drawn and which are in view, while the page scrolls. */
export function useRowWindow(count: number) {
  const firstBody = useRef<HTMLTableSectionElement>(null)
  const [margin, setMargin] = useState(0)
  const height = useWindowHeight()
  const windowed = count > MOST_DRAWN
  const virtualizer = useWindowVirtualizer({
    count,
    estimateSize: () => ROW_HEIGHT,
    overscan: 12,
    scrollMargin: margin,
  })
  useLayoutEffect(() => {
    const table = firstBody.current?.closest('table')
    const head = table?.tHead
    if (!table || !head) return
    setMargin(table.getBoundingClientRect().top + window.scrollY + head.offsetHeight)
  }, [])
  const items = virtualizer.getVirtualItems()
  const first = windowed ? (items[0]?.index ?? 0) : 0
  const end = windowed ? (items.at(-1)?.index ?? -1) + 1 : count
  const scrolled = (virtualizer.scrollOffset ?? 0) - margin
  const reveal = useCallback(
    (index: number) => {
      if (windowed) virtualizer.scrollToIndex(index, { align: 'auto' })
    },
    [virtualizer, windowed],
  )
  return {
    firstBody,
    reveal,
    rendered: { first, end, before: first, after: count - end },
    inView: [
      clamp(Math.ceil(scrolled / ROW_HEIGHT - 0.5), count),
      clamp(Math.floor((scrolled + height) / ROW_HEIGHT - 0.5), count),
    ] as const,
  }
}

function clamp(index: number, count: number): number {
  return Math.max(0, Math.min(index, count - 1))
}
