/**
 * A ratio as text, cut and never rounded, so that 4.49999 never reads 4.50: screens take two decimals, logs four.
 * @param ratio 1 to 21
 * @throws {TypeError} for what is no finite number
 */
export function truncateRatio(ratio: number, decimals: number): string {
  if (!Number.isFinite(ratio)) throw new TypeError(`a ratio is a finite number, not ${ratio}`)
  const [whole = '0', fraction = ''] = String(ratio).split('.')
  return decimals === 0 ? whole : `${whole}.${fraction.slice(0, decimals).padEnd(decimals, '0')}`
}

/** A finding's state in words: `rest/rest` is `rest`; where the sides differ, `hover on rest`. */
export function stateInWords(state: string): string {
  const [foreground = '', background = ''] = state.split('/')
  return foreground === background || background === ''
    ? foreground
    : `${foreground} on ${background}`
}

const SMALL_NUMBERS = 'no one two three four five six seven eight nine ten eleven twelve'.split(' ')

/** A count in a sentence: words to twelve, then figures. */
export function countInWords(count: number): string {
  return SMALL_NUMBERS[count] ?? String(count)
}

/** A count of things: `two breaches`, `one breach`, `no breaches`. */
export function countOf(count: number, one: string, many = `${one}s`): string {
  return `${countInWords(count)} ${count === 1 ? one : many}`
}
