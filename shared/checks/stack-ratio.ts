import { contrastRatio } from '#shared/color/luminance.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { type Basis, createPixel, luminanceOf, type Pixel, paintLayer } from './layers.ts'
import { leastRatio } from './unknown-backdrop.ts'

/** What lies under a pair in one theme: ground first, then its backdrop; or not known. */
export interface Underlay {
  readonly layers: readonly RenderedColor[]
  readonly isUnknown: boolean
  /** Layers of it that can be seen through, counted from its topmost opaque one. */
  readonly translucent: number
  /** Whether what can be seen of it leaves sRGB or is translucent. */
  readonly isWide: boolean
}

/** Two sides to measure against each other. Mutable: one object serves all rows of a pair. */
export interface MeasuredStack {
  foreground: RenderedColor
  background: RenderedColor
  underlay: Underlay
  /** Whether the foreground lies on the background, or beside it on the backdrop. */
  isLaidOn: boolean
}

function isTranslucentLayer(layer: RenderedColor): boolean {
  return layer.a > 0 && layer.a < 255
}

/** Reads the layers under a pair, bottom first; what an opaque one hides does not count. */
export function toUnderlay(layers: readonly RenderedColor[], isUnknown: boolean): Underlay {
  let translucent = 0
  let isWide = false
  for (const layer of layers) {
    translucent = translucentOver(layer, translucent)
    isWide = wideOver(layer, isWide)
  }
  return { layers, isUnknown, translucent, isWide }
}

/** Visible translucent layers, with one more laid on top. */
export function translucentOver(layer: RenderedColor, below: number): number {
  if (layer.a === 255) return 0
  return isTranslucentLayer(layer) ? below + 1 : below
}

/** Whether what is visible leaves sRGB or is translucent, with one more layer laid on top. */
export function wideOver(layer: RenderedColor, below: boolean): boolean {
  if (layer.a === 255) return layer.gamut !== 'srgb'
  return isTranslucentLayer(layer) || below
}

const upper = createPixel()
const lower = createPixel()

function paintUnderlay(pixel: Pixel, underlay: Underlay, basis: Basis): void {
  for (let at = 0; at < underlay.layers.length; at++) {
    paintLayer(pixel, underlay.layers[at]!, basis)
  }
}

/** Whether what is under the pair can be seen through it at all. */
function showsUnderlay(stack: MeasuredStack): boolean {
  return stack.background.a < 255 || (!stack.isLaidOn && stack.foreground.a < 255)
}

/** The ratio of two sides in one basis, each moved by a number of levels on all channels. */
export function stackRatio(
  stack: MeasuredStack,
  basis: Basis,
  levels: { readonly foreground: number; readonly background: number },
): number {
  if (stack.underlay.isUnknown && showsUnderlay(stack)) return leastRatio(stack, basis, levels)
  paintUnderlay(lower, stack.underlay, basis)
  upper.r = lower.r
  upper.g = lower.g
  upper.b = lower.b
  paintLayer(lower, stack.background, basis)
  if (stack.isLaidOn) {
    upper.r = lower.r
    upper.g = lower.g
    upper.b = lower.b
  }
  paintLayer(upper, stack.foreground, basis)
  return contrastRatio(
    luminanceOf(upper, basis, levels.foreground),
    luminanceOf(lower, basis, levels.background),
  )
}
