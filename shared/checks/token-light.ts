import { relativeLuminance, relativeLuminanceP3 } from '#shared/color/luminance.ts'
import type { ResolvedCell } from './resolved.ts'

/** Opaque and inside sRGB: its ratio to another such colour is one division. */
export const LIGHT_PLAIN = 0
/** Opaque and outside sRGB, so that it is measured on P3 too where that ships. */
export const LIGHT_WIDE = 1
/** What lies under it can be seen. */
export const LIGHT_TRANSLUCENT = 2

/** What measuring reads of a token's cells, in columns by the same offsets. */
export interface TokenLight {
  /** WCAG relative luminance of the shipped sRGB bytes. */
  readonly srgb: readonly number[]
  /** Luminance of the Display P3 bytes. */
  readonly p3: readonly number[]
  /** LIGHT_…; of two cells the bits of both hold. */
  readonly kinds: readonly number[]
}

/** Reads the light of a token's cells. */
export function lightOf(cells: readonly ResolvedCell[]): TokenLight {
  const srgb: number[] = []
  const p3: number[] = []
  const kinds: number[] = []
  for (const { color } of cells) {
    const { r, g, b, a, p3r, p3g, p3b, gamut } = color.rendered
    srgb.push(relativeLuminance(r, g, b))
    p3.push(relativeLuminanceP3(p3r, p3g, p3b))
    kinds.push(a < 255 ? LIGHT_TRANSLUCENT : gamut === 'srgb' ? LIGHT_PLAIN : LIGHT_WIDE)
  }
  return { srgb, p3, kinds }
}
