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
  /** As it is painted in each basis; what is not known is not painted. */
  readonly painted: { readonly [basis in Basis]: Readonly<Pixel> }
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
  const painted = { srgb: paintedOf(layers, 'srgb'), p3: paintedOf(layers, 'p3') }
  return { layers, isUnknown, translucent, isWide, painted }
}

function paintedOf(layers: readonly RenderedColor[], basis: Basis): Pixel {
  const pixel = createPixel()
  for (const layer of layers) paintLayer(pixel, layer, basis)
  return pixel
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

/** Whether what is under the pair can be seen through it at all. */
function showsUnderlay(stack: MeasuredStack): boolean {
  return stack.background.a < 255 || (!stack.isLaidOn && stack.foreground.a < 255)
}

function copyPixel(from: Readonly<Pixel>, to: Pixel): void {
  to.r = from.r
  to.g = from.g
  to.b = from.b
}

/** Paints both sides into `upper` and `lower`. */
function paintSides(stack: MeasuredStack, basis: Basis): void {
  const under = stack.underlay.painted[basis]
  copyPixel(under, lower)
  paintLayer(lower, stack.background, basis)
  copyPixel(stack.isLaidOn ? lower : under, upper)
  paintLayer(upper, stack.foreground, basis)
}

/** The ratio of two sides in one basis. */
export function stackRatio(stack: MeasuredStack, basis: Basis): number {
  if (stack.underlay.isUnknown && showsUnderlay(stack)) return leastRatio(stack, basis, UNMOVED)
  paintSides(stack, basis)
  return contrastRatio(luminanceOf(upper, basis), luminanceOf(lower, basis))
}

const UNMOVED = { foreground: 0, background: 0 }
const moved = { foreground: 0, background: 0 }

/**
 * Writes the four ratios of two sides, each moved on all channels by a number of levels, down or up.
 * @param by levels of each side, 0 or more
 */
export function writeMovedRatios(
  stack: MeasuredStack,
  basis: Basis,
  by: { readonly foreground: number; readonly background: number },
  out: Float64Array,
): void {
  if (stack.underlay.isUnknown && showsUnderlay(stack)) {
    for (let corner = 0; corner < 4; corner++) {
      moved.foreground = corner & 1 ? by.foreground : -by.foreground
      moved.background = corner & 2 ? by.background : -by.background
      out[corner] = leastRatio(stack, basis, moved)
    }
    return
  }
  paintSides(stack, basis)
  const over = luminanceOf(upper, basis, -by.foreground)
  const overUp = luminanceOf(upper, basis, by.foreground)
  const under = luminanceOf(lower, basis, -by.background)
  const underUp = luminanceOf(lower, basis, by.background)
  out[0] = contrastRatio(over, under)
  out[1] = contrastRatio(overUp, under)
  out[2] = contrastRatio(over, underUp)
  out[3] = contrastRatio(overUp, underUp)
}
