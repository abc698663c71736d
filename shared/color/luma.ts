/** What red and blue weigh in a luma; green weighs the rest. */
export interface LumaWeights {
  readonly red: number
  readonly blue: number
}

/** The weights of the two broadcast standards. @see ITU-R BT.601-7 section 2.5.1 @see ITU-R BT.709-6 item 3.2 */
export const LUMA_WEIGHTS = {
  bt601: { red: 0.299, blue: 0.114 },
  bt709: { red: 0.2126, blue: 0.0722 },
} as const satisfies { readonly [standard: string]: LumaWeights }

/** Luma with its two colour differences. */
export interface LumaReading {
  /** Y′, 0 to 1: a weighted sum of gamma-coded channels. It is not luminance, which weighs linear light. */
  readonly luma: number
  /** −0.5 to 0.5. */
  readonly pb: number
  /** −0.5 to 0.5. */
  readonly pr: number
}

/**
 * Measures luma and colour differences of gamma-coded R′G′B′.
 * @param r gamma-coded component 0 to 1; `g` and `b` alike
 * @returns unrounded
 */
export function lumaOf(r: number, g: number, b: number, weights: LumaWeights): LumaReading {
  const { red, blue } = weights
  const luma = red * r + (1 - red - blue) * g + blue * b
  return { luma, pb: (b - luma) / (2 * (1 - blue)), pr: (r - luma) / (2 * (1 - red)) }
}
