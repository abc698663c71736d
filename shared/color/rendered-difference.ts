import { writeOklab } from './rgb-gamut.ts'
import type { RenderedColor } from './render.ts'
import { linearOf } from './transfer.ts'

const LINEAR = Float64Array.from({ length: 256 }, (_, byte) => linearOf(byte / 255))
const first = new Float64Array(3)
const second = new Float64Array(3)

function distance(): number {
  return Math.hypot(first[0]! - second[0]!, first[1]! - second[1]!, first[2]! - second[2]!)
}

function writeSrgb({ r, g, b }: RenderedColor, out: Float64Array): void {
  writeOklab(LINEAR[r]!, LINEAR[g]!, LINEAR[b]!, 'srgb', out)
}

function writeP3({ p3r, p3g, p3b }: RenderedColor, out: Float64Array): void {
  writeOklab(LINEAR[p3r]!, LINEAR[p3g]!, LINEAR[p3b]!, 'p3', out)
}

/**
 * Measures ΔE OK between two colours as they ship: their bytes, not their sources. Alpha is left out.
 * @param withP3 whether Display P3 ships too; then the larger difference counts where one of them leaves sRGB
 * @returns 0 or more, unrounded; 0 for equal bytes
 * @see https://www.w3.org/TR/css-color-4/#color-difference-OK
 */
export function renderedDifference(
  before: RenderedColor,
  after: RenderedColor,
  withP3: boolean,
): number {
  writeSrgb(before, first)
  writeSrgb(after, second)
  const srgb = distance()
  if (!withP3 || (before.gamut === 'srgb' && after.gamut === 'srgb')) return srgb
  writeP3(before, first)
  writeP3(after, second)
  return Math.max(srgb, distance())
}
