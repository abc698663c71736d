import { useSyncExternalStore } from 'react'

function onResize(notify: () => void) {
  window.addEventListener('resize', notify)
  return () => window.removeEventListener('resize', notify)
}

/** Height of the window in px. */
export function useWindowHeight(): number {
  return useSyncExternalStore(onResize, () => window.innerHeight)
}

/** Width of the window in px. */
export function useWindowWidth(): number {
  return useSyncExternalStore(onResize, () => window.innerWidth)
}

/** ≤ 720 px: the strip and the rows are laid out anew; ≤ 900 px the ways out go into a menu. */
const NARROW = '(max-width: 720px)'
const COMPACT = '(max-width: 900px)'

const onChangeOf = (query: string) => (notify: () => void) => {
  const list = window.matchMedia(query)
  list.addEventListener('change', notify)
  return () => list.removeEventListener('change', notify)
}
const onNarrow = onChangeOf(NARROW)
const onCompact = onChangeOf(COMPACT)

/** Whether the page is laid out for a narrow screen (or a high zoom). */
export function useNarrow(): boolean {
  return useSyncExternalStore(onNarrow, () => window.matchMedia(NARROW).matches)
}

/** Whether the top line has no room for all its places. */
export function useCompact(): boolean {
  return useSyncExternalStore(onCompact, () => window.matchMedia(COMPACT).matches)
}
