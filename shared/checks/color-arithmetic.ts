import type { Oklch } from '#shared/color/oklch.ts'
import { renderColor } from '#shared/color/render.ts'
import { turned } from '#shared/color/to-oklch.ts'
import type { Adjustment } from './model.ts'
import type { ResolvedColor } from './resolved.ts'

/** Stops a lightness or an alpha at 0 and 1. */
export function clamp01(value: number): number {
  return Math.min(1, Math.max(0, value))
}

/** Lightness as arithmetic sees it: a missing one counts as 0. */
export function lightnessOf(color: ResolvedColor): number {
  return color.oklch.l ?? 0
}

/** Renders a colour once, for all who share it. */
export function toResolvedColor(oklch: Oklch): ResolvedColor {
  return { oklch, rendered: renderColor(oklch) }
}

/** The colour with members replaced; the very same object where nothing differs. */
export function changed(color: ResolvedColor, members: Partial<Oklch>): ResolvedColor {
  const oklch = { ...color.oklch, ...members }
  return sameOklch(oklch, color.oklch) ? color : toResolvedColor(oklch)
}

/** Whether two stored colours are equal to the last digit, missing components included. */
export function sameOklch(first: Oklch, second: Oklch): boolean {
  return (
    first.l === second.l &&
    first.c === second.c &&
    first.h === second.h &&
    first.alpha === second.alpha
  )
}

/** A factor on a component; what is missing stays missing, and what a double cannot hold stops at its largest. */
export function scaled(component: number | null, factor: number): number | null {
  return component === null ? null : Math.min(Number.MAX_VALUE, component * factor)
}

/** A hue turned by degrees, 0 ≤ h < 360; a missing hue stays missing. */
export function turnedHue(hue: number | null, degrees: number): number | null {
  return hue === null || degrees === 0 ? hue : turned(hue + degrees)
}

/** Lightness and hue added, chroma and alpha multiplied; lightness and alpha stop at 0 and 1. */
export function adjusted(color: ResolvedColor, adjustment: Adjustment): ResolvedColor {
  const { lightness = 0, chroma = 1, hue = 0, alpha = 1 } = adjustment
  const { oklch } = color
  return changed(color, {
    l: lightness === 0 ? oklch.l : clamp01((oklch.l ?? 0) + lightness),
    c: scaled(oklch.c, chroma),
    h: turnedHue(oklch.h, hue),
    alpha: oklch.alpha === null ? null : clamp01(oklch.alpha * alpha),
  })
}
