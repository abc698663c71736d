import type { RenderedColor } from '#shared/color/render.ts'

export type Basis = 'srgb' | 'p3'
export type Bytes = readonly [number, number, number]

/** Layers from the bottom up, the lowest one opaque, each channel rounded half up after each layer. */
export function paintAll(
  layers: readonly RenderedColor[],
  basis: Basis,
  start: Bytes = [0, 0, 0],
): Bytes {
  return layers.reduce<Bytes>((under, layer) => {
    const top: Bytes =
      basis === 'p3' ? [layer.p3r, layer.p3g, layer.p3b] : [layer.r, layer.g, layer.b]
    const alpha = layer.a / 255
    const channel = (at: 0 | 1 | 2) => Math.floor(top[at] * alpha + under[at] * (1 - alpha) + 0.5)
    return [channel(0), channel(1), channel(2)]
  }, start)
}

function linear(byte: number): number {
  const v = byte / 255
  return v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4
}

/** WCAG 2.2, relative luminance; for P3 the coefficients of the engine specification. */
export function naiveLuminance([r, g, b]: Bytes, basis: Basis): number {
  const [wr, wg, wb] = basis === 'p3' ? [0.228975, 0.691739, 0.079286] : [0.2126, 0.7152, 0.0722]
  return wr * linear(r) + wg * linear(g) + wb * linear(b)
}

/** WCAG 2.2, contrast ratio. */
export function naiveRatio(first: Bytes, second: Bytes, basis: Basis): number {
  const [y1, y2] = [naiveLuminance(first, basis), naiveLuminance(second, basis)]
  return Math.min(21, (Math.max(y1, y2) + 0.05) / (Math.min(y1, y2) + 0.05))
}

export function moved(bytes: Bytes, by: number): Bytes {
  const one = (byte: number) => Math.min(255, Math.max(0, byte + by))
  return [one(bytes[0]), one(bytes[1]), one(bytes[2])]
}
