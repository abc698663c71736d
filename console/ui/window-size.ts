import { useSyncExternalStore } from 'react'

function onResize(notify: () => void) {
  window.addEventListener('resize', notify)
  return () => window.removeEventListener('resize', notify)
}

/** Height of the window in px. */
export function useWindowHeight(): number {
  return useSyncExternalStore(onResize, () => window.innerHeight)
}

const NARROW = '(max-width: 720px)'

function onNarrow(notify: () => void) {
  const list = window.matchMedia(NARROW)
  list.addEventListener('change', notify)
  return () => list.removeEventListener('change', notify)
}

/** Whether the page is laid out for a narrow screen (or a high zoom). */
export function useNarrow(): boolean {
  return useSyncExternalStore(onNarrow, () => window.matchMedia(NARROW).matches)
}
