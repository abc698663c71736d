import { compositeChannel } from '#shared/color/composite.ts'
import { contrastRatio, relativeLuminance, relativeLuminanceP3 } from '#shared/color/luminance.ts'
import type { RenderedColor } from '#shared/color/render.ts'

/** The two measures; a stack of layers is composited in one of them. */
export type Basis = 'srgb' | 'p3'

/** A pixel as it is painted: opaque bytes, filled in place so that measuring makes no objects. */
export interface Pixel {
  r: number
  g: number
  b: number
}

/** Makes a pixel to paint on. */
export function createPixel(): Pixel {
  return { r: 0, g: 0, b: 0 }
}

/** Lays a layer over a pixel: source-over on gamma-coded bytes, rounded half up. */
export function paintLayer(pixel: Pixel, layer: RenderedColor, basis: Basis): void {
  const isP3 = basis === 'p3'
  const r = isP3 ? layer.p3r : layer.r
  const g = isP3 ? layer.p3g : layer.g
  const b = isP3 ? layer.p3b : layer.b
  if (layer.a === 255) {
    pixel.r = r
    pixel.g = g
    pixel.b = b
    return
  }
  const alpha = layer.a / 255
  pixel.r = compositeChannel(r, alpha, pixel.r)
  pixel.g = compositeChannel(g, alpha, pixel.g)
  pixel.b = compositeChannel(b, alpha, pixel.b)
}

/** One channel of a layer: 0 red, 1 green, 2 blue. */
export function layerChannel(layer: RenderedColor, basis: Basis, channel: number): number {
  if (basis === 'p3') return channel === 0 ? layer.p3r : channel === 1 ? layer.p3g : layer.p3b
  return channel === 0 ? layer.r : channel === 1 ? layer.g : layer.b
}

/** What one channel adds to luminance: 0 red, 1 green, 2 blue. */
export function channelLuminance(byte: number, basis: Basis, channel: number): number {
  const measure = basis === 'p3' ? relativeLuminanceP3 : relativeLuminance
  if (channel === 0) return measure(byte, 0, 0)
  return channel === 1 ? measure(0, byte, 0) : measure(0, 0, byte)
}

/** A byte moved by levels, within 0 to 255. */
export function movedByte(byte: number, levels: number): number {
  return Math.min(255, Math.max(0, byte + levels))
}

/** Luminance of a pixel with every channel moved by a number of levels. */
export function luminanceOf(pixel: Pixel, basis: Basis, levels = 0): number {
  const measure = basis === 'p3' ? relativeLuminanceP3 : relativeLuminance
  if (levels === 0) return measure(pixel.r, pixel.g, pixel.b)
  return measure(movedByte(pixel.r, levels), movedByte(pixel.g, levels), movedByte(pixel.b, levels))
}

const upper = createPixel()
const lower = createPixel()

/** The WCAG ratio of one colour laid on another, both on an opaque ground. */
export function ratioOn(
  color: RenderedColor,
  under: { readonly reference: RenderedColor; readonly ground: RenderedColor },
): number {
  paintLayer(lower, under.ground, 'srgb')
  paintLayer(lower, under.reference, 'srgb')
  upper.r = lower.r
  upper.g = lower.g
  upper.b = lower.b
  paintLayer(upper, color, 'srgb')
  return contrastRatio(luminanceOf(upper, 'srgb'), luminanceOf(lower, 'srgb'))
}
