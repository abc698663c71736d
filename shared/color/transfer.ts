/**
 * Decodes one sRGB or Display P3 component to linear light; negatives keep their sign (CSS extends the curve that way).
 * @param encoded Gamma-coded component; in gamut it is 0 to 1.
 * @returns Linear-light component, unrounded.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code lin_sRGB
 */
export function linearOf(encoded: number): number {
  const size = Math.abs(encoded)
  return size <= 0.04045 ? encoded / 12.92 : Math.sign(encoded) * ((size + 0.055) / 1.055) ** 2.4
}

/**
 * Encodes one linear-light component with the curve that sRGB and Display P3 share; negatives keep their sign.
 * @param linear Linear-light component; in gamut it is 0 to 1.
 * @returns Gamma-coded component, unrounded.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code gam_sRGB
 */
export function encodedOf(linear: number): number {
  const size = Math.abs(linear)
  return size > 0.0031308 ? Math.sign(linear) * (1.055 * size ** (1 / 2.4) - 0.055) : 12.92 * linear
}

/**
 * Rounds a component or an alpha to the byte that ships, halves up.
 * @param component 0 to 1; anything outside is clamped.
 * @returns An integer from 0 to 255.
 */
export function byteOf(component: number): number {
  return Math.floor(Math.min(1, Math.max(0, component)) * 255 + 0.5)
}
