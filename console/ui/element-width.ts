import { type RefObject, useEffect, useState, useSyncExternalStore } from 'react'

/** Width of an element in px as it is laid out; `fallback` until it was. */
export function useElementWidth(element: RefObject<Element | null>, fallback: number): number {
  const [width, setWidth] = useState(fallback)
  useEffect(() => {
    const target = element.current
    if (target === null) return
    const observer = new ResizeObserver(([entry]) => {
      if (entry !== undefined) setWidth(Math.round(entry.contentRect.width))
    })
    observer.observe(target)
    return () => observer.disconnect()
  }, [element])
  return width
}

function onPrint(notify: () => void) {
  const list = window.matchMedia('print')
  list.addEventListener('change', notify)
  return () => list.removeEventListener('change', notify)
}

/** Whether the page is being printed. */
export function usePrinting(): boolean {
  return useSyncExternalStore(onPrint, () => window.matchMedia('print').matches)
}
