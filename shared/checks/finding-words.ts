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

/** The nearest colour that passes, and where it is to be set, as a check answers it. */
export interface NearestColorAnswer {
  readonly token: string
  readonly theme: string
  readonly state: string
  /** Whether it is the token's own value, no override. */
  readonly source: boolean
  readonly color: {
    readonly components: readonly (number | 'none')[]
    readonly alpha?: number | undefined
  }
  readonly hex: string
}

/** A finding of a check, as far as its repair goes. */
export interface RepairAnswer {
  readonly nearest?: NearestColorAnswer | undefined
  readonly unmended?:
    | {
        readonly reason: 'locked' | 'conflict' | 'budget'
        readonly conflict?:
          | { readonly bound?: { readonly needed: number; readonly available: number } | undefined }
          | undefined
      }
    | undefined
}

/**
 * What would make a finding pass, in words; nothing where nobody asked. The colour is written whole, so that it
 * passes as it is copied: `the nearest that passes: oklch(0.551 0.128 243) #1478b6 for action.board.fill in dark`.
 */
export function repairInWords({ nearest, unmended }: RepairAnswer): string | undefined {
  if (nearest !== undefined) {
    const { token, theme, state, source, color, hex } = nearest
    const { components, alpha = 1 } = color
    const text = `oklch(${components.join(' ')}${alpha === 1 ? '' : ` / ${alpha}`})`
    const place = source ? '' : ` in ${theme}${state === 'rest' ? '' : `, ${state}`}`
    return `the nearest that passes: ${text} ${hex} for ${token}${place}`
  }
  if (unmended === undefined) return undefined
  const { reason, conflict } = unmended
  if (reason === 'locked') return 'nothing passes: what it hangs on is locked'
  if (reason === 'budget') return 'the nearest that passes was not searched to the end'
  const { bound } = conflict ?? {}
  if (bound === undefined) return 'nothing passes: no colour of its hue meets all it must'
  const available = truncateRatio(bound.available, 4)
  return `nothing passes: the colours on its two sides have ${available} to each other, ${bound.needed} is needed`
}
