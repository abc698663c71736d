import { LINEAR_SRGB_TO_LINEAR_P3 } from './matrices.ts'
import { byteOf, encodedOf, linearOf } from './transfer.ts'

const LINEAR = Float64Array.from({ length: 256 }, (_, byte) => linearOf(byte / 255))

/**
 * Converts a shipped sRGB colour to Display P3 and rounds each channel half up.
 * @param r Byte 0 to 255; `g` and `b` alike.
 * @param out Receives the result; a fresh array if left out.
 * @returns `out`: Display P3 bytes 0 to 255.
 * @see https://www.w3.org/TR/css-color-4/#color-conversion-code
 */
export function srgbBytesToP3Bytes(
  r: number,
  g: number,
  b: number,
  out: Uint8ClampedArray = new Uint8ClampedArray(3),
): Uint8ClampedArray {
  const red = LINEAR[r]!
  const green = LINEAR[g]!
  const blue = LINEAR[b]!
  const m = LINEAR_SRGB_TO_LINEAR_P3
  out[0] = byteOf(encodedOf(m[0] * red + m[1] * green + m[2] * blue))
  out[1] = byteOf(encodedOf(m[3] * red + m[4] * green + m[5] * blue))
  out[2] = byteOf(encodedOf(m[6] * red + m[7] * green + m[8] * blue))
  return out
}
