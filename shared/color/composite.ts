/**
 * Lays one gamma-coded channel over an opaque one: source-over, rounded half up after the layer.
 * @param top Byte 0 to 255 of the upper colour.
 * @param alpha Opacity of the upper colour, 0 to 1.
 * @param under Byte 0 to 255 of the opaque colour beneath.
 * @returns A byte 0 to 255.
 * @see https://www.w3.org/TR/compositing-1/#simplealphacompositing
 */
export function compositeChannel(top: number, alpha: number, under: number): number {
  return Math.floor(top * alpha + under * (1 - alpha) + 0.5)
}
