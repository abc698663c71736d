import type { Oklch } from './oklch.ts'

const HEX = Array.from({ length: 256 }, (_, byte) => byte.toString(16).padStart(2, '0'))

/**
 * Writes a stored colour as CSS `oklch()`; reading the text back gives the same doubles.
 * @returns Numbers unrounded, `none` for a missing component, alpha left out where it is 1.
 * @see https://www.w3.org/TR/css-color-4/#serializing-oklab-oklch
 * @example formatOklch({ l: 0.62, c: 0.12, h: 240, alpha: 1 }) // 'oklch(0.62 0.12 240)'
 */
export function formatOklch(color: Oklch): string {
  const { l, c, h, alpha } = color
  const body = `${componentText(l)} ${componentText(c)} ${componentText(h)}`
  return alpha === 1 ? `oklch(${body})` : `oklch(${body} / ${componentText(alpha)})`
}

/**
 * Writes bytes as CSS hex, lower case: six digits, or eight where the colour is translucent.
 * @param r Byte 0 to 255; `g`, `b` and `a` alike.
 * @see https://www.w3.org/TR/css-color-4/#hex-notation
 */
export function formatHex(r: number, g: number, b: number, a = 255): string {
  const opaque = `#${HEX[r]}${HEX[g]}${HEX[b]}`
  return a === 255 ? opaque : `${opaque}${HEX[a]}`
}

function componentText(component: number | null): string {
  return component === null ? 'none' : String(component)
}
