import { isInGamut, mapToGamut } from './gamut-map.ts'
import type { Oklch } from './oklch.ts'
import { srgbBytesToP3Bytes } from './p3.ts'
import { byteOf } from './transfer.ts'

/** A colour as it ships, is seen and is measured: bytes 0 to 255 throughout. */
export interface RenderedColor {
  /** Gamma-coded sRGB. */
  readonly r: number
  readonly g: number
  readonly b: number
  /** Opacity: k of k/255. */
  readonly a: number
  /** Gamma-coded Display P3: the shipped sRGB converted where the colour lies in sRGB, else its own mapping. */
  readonly p3r: number
  readonly p3g: number
  readonly p3b: number
  /** The narrowest gamut that holds the stored colour. */
  readonly gamut: 'srgb' | 'p3' | 'beyond'
}

const mapped = new Float64Array(3)
const p3 = new Uint8ClampedArray(3)

/**
 * Renders a stored colour: mapped into sRGB and Display P3, each channel and the alpha rounded half up to k/255.
 * A missing component counts as 0.
 * @param color The stored colour.
 * @returns Bytes, and the gamut the colour came from.
 * @see https://www.w3.org/TR/css-color-4/#css-gamut-mapping-algorithm
 */
export function renderColor(color: Oklch): RenderedColor {
  const l = color.l ?? 0
  const c = color.c ?? 0
  const h = color.h ?? 0
  mapToGamut(l, c, h, 'srgb', mapped)
  const r = byteOf(mapped[0]!)
  const g = byteOf(mapped[1]!)
  const b = byteOf(mapped[2]!)
  const gamut = isInGamut(l, c, h, 'srgb') ? 'srgb' : isInGamut(l, c, h, 'p3') ? 'p3' : 'beyond'
  if (gamut === 'srgb') {
    srgbBytesToP3Bytes(r, g, b, p3)
  } else {
    mapToGamut(l, c, h, 'p3', mapped)
    for (let i = 0; i < 3; i++) p3[i] = byteOf(mapped[i]!)
  }
  return { r, g, b, a: byteOf(color.alpha ?? 0), p3r: p3[0]!, p3g: p3[1]!, p3b: p3[2]!, gamut }
}
