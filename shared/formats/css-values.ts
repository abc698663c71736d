import { parseColor } from '#shared/color/parse-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { readCssIdentifier } from './css-identifier.ts'

/** What a custom property is set to, as far as colours go. */
export type CssValue =
  | { readonly kind: 'color'; readonly color: Oklch }
  | { readonly kind: 'alias'; readonly property: string; readonly fallback?: string }
  | { readonly kind: 'other'; readonly why: string }

/** Patterns run over a value once for each fallback in it, so it has an end. */
const LONGEST = 1024

/**
 * Reads a value: a fixed colour, or a reference to another property. Anything else may still be good CSS.
 * @see https://www.w3.org/TR/css-variables-1/#using-variables
 */
export function readCssValue(text: string): CssValue {
  if (text.length > LONGEST) return { kind: 'other', why: 'It is longer than any colour' }
  const reference = /^var\(\s*(--(?:\\[\s\S]|[^\s,()\\])+)\s*(?:,([\s\S]*))?\)$/i.exec(text)
  if (reference) {
    const [, property = '', fallback] = reference
    return {
      kind: 'alias',
      property: readCssIdentifier(property),
      ...(fallback === undefined ? {} : { fallback: fallback.trim() }),
    }
  }
  const reading = parseColor(text)
  return reading.ok
    ? { kind: 'color', color: reading.color }
    : { kind: 'other', why: reading.reason }
}

/**
 * Splits a `light-dark()` into its two values.
 * @returns nothing where the text is no such function
 * @see https://www.w3.org/TR/css-color-5/#light-dark
 */
export function readLightDark(text: string): readonly [light: string, dark: string] | undefined {
  if (text.length > 2 * LONGEST) return undefined
  const inner = /^light-dark\(([\s\S]*)\)$/i.exec(text)?.[1]
  if (inner === undefined) return undefined
  const parts = ['']
  let depth = 0
  for (const character of inner) {
    depth += character === '(' ? 1 : character === ')' ? -1 : 0
    if (depth < 0) return undefined
    if (character === ',' && depth === 0) parts.push('')
    else parts[parts.length - 1] += character
  }
  const [light = '', dark, ...more] = parts.map((part) => part.trim())
  return dark === undefined || more.length > 0 ? undefined : [light, dark]
}
