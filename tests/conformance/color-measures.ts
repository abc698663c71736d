import { compositeChannel } from '#shared/color/composite.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { encodedOf, linearOf } from '#shared/color/transfer.ts'

export type Rgb = readonly [number, number, number]

/** The OKLCH of a CSS text that has to be readable. */
export function oklchOfText(text: string): Oklch {
  const reading = parseColor(text)
  if (!reading.ok) throw new Error(`${text}: ${reading.reason}`)
  return reading.color
}

export function bytesOf(text: string): Rgb {
  const { r, g, b } = renderColor(oklchOfText(text))
  return [r, g, b]
}

export function alphaOf(text: string): number {
  return oklchOfText(text).alpha ?? 0
}

/** Lays `top` over `under`, rounding each channel to a byte. */
export function laidOver(top: Rgb, alpha: number, under: Rgb): Rgb {
  return [
    compositeChannel(top[0], alpha, under[0]),
    compositeChannel(top[1], alpha, under[1]),
    compositeChannel(top[2], alpha, under[2]),
  ]
}

export function ratioOfBytes(first: Rgb, second: Rgb): number {
  return contrastRatio(relativeLuminance(...first), relativeLuminance(...second))
}

export function ratioOfTexts(first: string, second: string): number {
  return ratioOfBytes(bytesOf(first), bytesOf(second))
}

/** The formula itself, on channels that no byte rounding touched: for rows that are not about verdicts. */
export function unroundedRatio(first: Rgb, second: Rgb): number {
  const luminance = ([r, g, b]: Rgb) =>
    0.2126 * linearOf(r / 255) + 0.7152 * linearOf(g / 255) + 0.0722 * linearOf(b / 255)
  return contrastRatio(luminance(first), luminance(second))
}

export function blended(top: Rgb, alpha: number, under: Rgb): Rgb {
  const mix = (channel: 0 | 1 | 2) => top[channel] * alpha + under[channel] * (1 - alpha)
  return [mix(0), mix(1), mix(2)]
}

export function blendedInLinearLight(top: Rgb, alpha: number, under: Rgb): Rgb {
  const linear = (color: Rgb): Rgb => [
    linearOf(color[0] / 255),
    linearOf(color[1] / 255),
    linearOf(color[2] / 255),
  ]
  const [r, g, b] = blended(linear(top), alpha, linear(under))
  return [encodedOf(r) * 255, encodedOf(g) * 255, encodedOf(b) * 255]
}
