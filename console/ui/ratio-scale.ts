/** The lines that WCAG draws; they run through every ruler. */
export const RATIO_LINES = [3, 4.5, 7] as const

/** Where a ratio stands on the logarithmic ruler from 1 to 21, in the unit of `width`. */
export function ratioPosition(ratio: number, width: number): number {
  return (Math.log(ratio) / Math.log(21)) * width
}
