import { joinWords } from '#console/lib/format.ts'
import { STATES, type State, type Use } from '#shared/checks/model.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'

/** Uses as a sentence says them. */
export const USE_CHOICES = [
  { value: 'text', text: 'text' },
  { value: 'large-text', text: 'large text' },
  { value: 'non-text', text: 'non-text' },
  { value: 'focus-adjacent', text: 'focus, beside it' },
  { value: 'focus-change', text: 'focus, as a change' },
  { value: 'link-in-text', text: 'a link in text' },
] as const

export const RELATION_CHOICES = [
  { value: 'inside', text: 'inside it, each with states of its own' },
  { value: 'together', text: 'together, one state over both' },
] as const

export const EXEMPTION_CHOICES = [
  { value: 'none', text: 'no exemption' },
  { value: 'logotype', text: 'as a logotype' },
  { value: 'decorative', text: 'as decoration' },
  { value: 'inactive', text: 'as inactive' },
] as const

/** What a pair is called. */
export function pairTitle({
  foreground,
  background,
}: Pick<PairWire, 'foreground' | 'background'>): string {
  return `${foreground} on ${background}`
}

/** `all states`, `rest`, `rest, hover and focus` */
export function statesInWords(states: readonly State[] | undefined): string {
  if (states === undefined) return 'all states'
  const listed = STATES.filter((state) => state === 'rest' || states.includes(state))
  return joinWords(listed)
}

export function themesInWords(themes: readonly string[] | undefined): string {
  return themes === undefined ? 'all themes' : joinWords(themes)
}

/** What lies under the background, bottom first. */
export function backdropInWords(backdrop: PairWire['backdrop']): string {
  if (backdrop === 'unknown') return 'not known'
  return backdrop === undefined || backdrop.length === 0
    ? 'the ground alone'
    : `the ground, then ${backdrop.join(', then ')}`
}

export function exemptionInWords(exempt: PairWire['exempt']): string {
  return exempt === undefined ? 'none' : `${exempt.kind}: ${exempt.reason}`
}

export function wordsOfUse(use: Use): string {
  return USE_CHOICES.find(({ value }) => value === use)?.text ?? use
}
