import { compositeChannel } from '#shared/color/composite.ts'
import { contrastRatio } from '#shared/color/luminance.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { type Basis, channelLuminance, layerChannel, movedByte } from './layers.ts'

/** Channels 0, 17, …, 255: sixteen of them, 4,096 backdrops. */
const STEPS = 16
const STEP = 17

/** Luminance by channel and backdrop step; filled again for each measurement. */
const upper = new Float64Array(3 * STEPS)
const lower = new Float64Array(3 * STEPS)

/** Two sides whose backdrop is not known. */
export interface UnknownStack {
  readonly foreground: RenderedColor
  readonly background: RenderedColor
  /** Whether the foreground lies on the background, or beside it on the backdrop. */
  readonly isLaidOn: boolean
}

/** What a channel adds to luminance does not depend on the other channels, so sixteen values a channel are all. */
function fillChannels(
  stack: UnknownStack,
  basis: Basis,
  levels: { readonly foreground: number; readonly background: number },
): void {
  const { foreground, background, isLaidOn } = stack
  for (let channel = 0; channel < 3; channel++) {
    const top = layerChannel(foreground, basis, channel)
    const bottom = layerChannel(background, basis, channel)
    for (let step = 0; step < STEPS; step++) {
      const backdrop = step * STEP
      const under = compositeChannel(bottom, background.a / 255, backdrop)
      const over = compositeChannel(top, foreground.a / 255, isLaidOn ? under : backdrop)
      const at = channel * STEPS + step
      upper[at] = channelLuminance(movedByte(over, levels.foreground), basis, channel)
      lower[at] = channelLuminance(movedByte(under, levels.background), basis, channel)
    }
  }
}

/**
 * The least ratio over 4,096 backdrops; 1 where one side is lighter on some and darker on others, since
 * between them lies a backdrop on which both are equal.
 * @param levels what each side is moved by on all channels, for a verdict's tightness
 */
export function leastRatio(
  stack: UnknownStack,
  basis: Basis,
  levels: { readonly foreground: number; readonly background: number },
): number {
  fillChannels(stack, basis, levels)
  let least = Number.POSITIVE_INFINITY
  let isLighter = false
  let isDarker = false
  for (let red = 0; red < STEPS; red++) {
    for (let green = 0; green < STEPS; green++) {
      const top = upper[red]! + upper[STEPS + green]!
      const bottom = lower[red]! + lower[STEPS + green]!
      for (let blue = 0; blue < STEPS; blue++) {
        const y1 = top + upper[2 * STEPS + blue]!
        const y2 = bottom + lower[2 * STEPS + blue]!
        if (y1 > y2) isLighter = true
        else if (y1 < y2) isDarker = true
        const ratio = contrastRatio(y1, y2)
        if (ratio < least) least = ratio
      }
    }
  }
  return isLighter && isDarker ? 1 : least
}
