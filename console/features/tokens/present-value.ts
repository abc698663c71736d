import type { Oklch } from '#shared/color/oklch.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import { numberOrMissing } from './token-source.tsx'
import type { PresentColor } from './trial-fields.tsx'
import { shortOklch } from './trial.ts'

/** The base theme's rest colour as it ships. */
export function presentColor(token: TokenWire, base: string): PresentColor {
  const rest = token.resolved[base]?.rest
  if (rest === undefined) return { color: { l: 0, c: 0, h: null, alpha: 1 }, hex: '#000000' }
  const [l = null, c = null, h = null] = rest.oklch.components.map(numberOrMissing)
  const color: Oklch = { l, c, h, alpha: rest.oklch.alpha ?? 1 }
  return { color, hex: rest.hex }
}

/** What the field says before anything is tried. */
export function presentText(token: TokenWire, base: string): string {
  return typeof token.value === 'string' ? token.value : shortOklch(presentColor(token, base).color)
}

/** What it is set to, in a sentence. */
export function valueInWords(token: TokenWire, base: string): string {
  return typeof token.value === 'object' && 'derive' in token.value
    ? `derived from ${token.value.derive}`
    : presentText(token, base)
}
