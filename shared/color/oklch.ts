/**
 * A colour as Dyewright stores it: OKLCH in doubles, nothing mapped, nothing rounded.
 * A `null` component is missing (`none` in CSS): it counts as 0 in arithmetic and survives storage and export.
 * @see https://www.w3.org/TR/css-color-4/#ok-lab
 */
export interface Oklch {
  /** Lightness, 0 (black) to 1 (white). */
  readonly l: number | null
  /** Chroma, 0 or more, no upper bound. */
  readonly c: number | null
  /** Hue angle in degrees, 0 ≤ h < 360. */
  readonly h: number | null
  /** Opacity, 0 to 1. */
  readonly alpha: number | null
}
