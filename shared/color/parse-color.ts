import { readCssColor } from './css-color.ts'
import { type OklchReading, oklchOf } from './to-oklch.ts'

/**
 * Reads any fixed CSS Color 4 colour into OKLCH; `none` in `oklch()`, and in any alpha, stays missing.
 * @param text A CSS colour: hex, a name, or a color function. No `calc()`, `currentcolor`, relative or mixed colour.
 * @returns The colour unrounded; or the reason why there is none, one sentence.
 * @see https://www.w3.org/TR/css-color-4/
 * @example parseColor('#3366cc') // { ok: true, color: { l: 0.53…, c: 0.15…, h: 262.…, alpha: 1 } }
 */
export function parseColor(text: string): OklchReading {
  const reading = readCssColor(text)
  return reading.ok ? oklchOf(reading.value) : reading
}
