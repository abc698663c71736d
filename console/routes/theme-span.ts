import type { ThemeSpan } from '#console/features/themes/themes-table.tsx'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { LedgerTokenWire } from '#shared/contracts/tokens.contract.ts'

/** Ground and ink of a theme as they ship, and their ratio. */
export function themeSpan(
  { key, ground, ink }: Pick<ThemeWire, 'key' | 'ground' | 'ink'>,
  tokens: readonly LedgerTokenWire[],
): ThemeSpan {
  const hexOf = (wanted: string) =>
    tokens.find(({ name }) => name === wanted)?.resolved[key]?.rest.hex ?? '#000000'
  const span = { ground: hexOf(ground), ink: hexOf(ink) }
  return { ...span, ratio: contrastRatio(luminanceOf(span.ground), luminanceOf(span.ink)) }
}

function luminanceOf(hex: string): number {
  const byte = (at: number) => Number.parseInt(hex.slice(at, at + 2), 16)
  return relativeLuminance(byte(1), byte(3), byte(5))
}
