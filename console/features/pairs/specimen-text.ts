import { startSentence } from '#console/lib/format.ts'

/** Last segments that say which part of a thing a colour is, not which thing. */
const PARTS = new Set(['text', 'label', 'ink', 'foreground', 'content', 'base', 'default', '$root'])

/**
 * The word by which a colour is shown: the end of its name, led by the segment before where the end alone names
 * a part or a step.
 * @example specimenText('action.board.text') // 'Board'
 */
export function specimenText(name: string): string {
  const segments = name.split('.')
  const last = segments.at(-1) ?? name
  const before = segments.at(-2)
  if (before === undefined) return startSentence(last)
  if (PARTS.has(last)) return startSentence(before)
  return startSentence(/^[\d\W]+$/.test(last) ? `${before} ${last}` : last)
}
