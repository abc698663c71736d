import type { ValueInput } from '#shared/contracts/fields.ts'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'

/** A value as a person writes it: a CSS colour, or a token in braces; a derivation in words. */
export function valueText(value: ValueInput): string {
  if (typeof value === 'string') return value
  if ('derive' in value) return derivationInWords(value)
  const read = readDtcgColor(value)
  if (!read.ok) return 'a colour that cannot be read'
  const { l, c, h, alpha } = read.color
  const body = `${short(l, 5)} ${short(c, 5)} ${short(h, 3)}`
  return alpha === 1 ? `oklch(${body})` : `oklch(${body} / ${short(alpha, 4)})`
}

type Derivation = Extract<ValueInput, { derive: string }>

function derivationInWords({ derive, lightness, chroma, hue, alpha }: Derivation): string {
  const parts = [
    lightness === undefined ? undefined : `lightness ${signed(lightness)}`,
    chroma === undefined ? undefined : `chroma × ${chroma}`,
    hue === undefined ? undefined : `hue ${signed(hue)}°`,
    alpha === undefined ? undefined : `alpha × ${alpha}`,
  ].filter((part) => part !== undefined)
  return ['from', derive, parts.join(', ')].filter((part) => part !== '').join(' ')
}

/** `+ 0.05`, `− 0.05` */
export function signed(value: number): string {
  return `${value < 0 ? '−' : '+'} ${Math.abs(value)}`
}

function short(component: number | null, decimals: number): string {
  return component === null ? 'none' : String(Number(component.toFixed(decimals)))
}
