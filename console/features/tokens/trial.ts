import type { SourceValue } from '#shared/checks/model.ts'
import { formatHex } from '#shared/color/format-color.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { type RenderedColor, renderColor } from '#shared/color/render.ts'

/** What a person wrote into the field, as far as it is understood. */
export type TrialReading =
  | {
      readonly kind: 'color'
      readonly value: SourceValue
      readonly color: Oklch
      readonly rendered: RenderedColor
      readonly hex: string
      /** The notation it was written in. */
      readonly notation: string
    }
  | { readonly kind: 'alias'; readonly value: SourceValue; readonly name: string }
  | { readonly kind: 'unread'; readonly reason: string }

/** Reads a colour or a token name in braces. */
export function readTrial(
  text: string,
  tokenId: (name: string) => string | undefined,
): TrialReading {
  const written = text.trim()
  const name = /^\{([^{}]+)\}$/.exec(written)?.[1]
  if (name !== undefined) {
    const token = tokenId(name)
    return token === undefined
      ? { kind: 'unread', reason: `There is no token ${name}.` }
      : { kind: 'alias', value: { kind: 'alias', token }, name }
  }
  if (written === '') return { kind: 'unread', reason: 'Write a CSS colour, or a token in braces.' }
  const parsed = parseColor(written)
  if (!parsed.ok) return { kind: 'unread', reason: asSentence(parsed.reason) }
  const rendered = renderColor(parsed.color)
  return {
    kind: 'color',
    value: { kind: 'color', color: parsed.color },
    color: parsed.color,
    rendered,
    hex: formatHex(rendered.r, rendered.g, rendered.b, rendered.a),
    notation: notationOf(written),
  }
}

function asSentence(reason: string): string {
  return `${reason.charAt(0).toUpperCase()}${reason.slice(1).replace(/\.$/, '')}.`
}

const NOTATIONS: readonly (readonly [RegExp, string])[] = [
  [/^#/, 'hex'],
  [/^rgba?\(/, 'sRGB'],
  [/^hsla?\(/, 'HSL'],
  [/^hwb\(/, 'HWB'],
  [/^lab\(/, 'CIE Lab'],
  [/^lch\(/, 'CIE LCH'],
  [/^oklab\(/, 'OKLab'],
  [/^oklch\(/, 'OKLCH'],
  [/^color\(\s*display-p3\b/, 'Display P3'],
  [/^color\(/, 'a colour of its own space'],
]

function notationOf(text: string): string {
  const found = NOTATIONS.find(([start]) => start.test(text.toLowerCase()))
  return found?.[1] ?? 'a CSS name'
}

/** Where the colour lies, for the sentence that says what was understood. */
export const GAMUT_WORDS = {
  srgb: 'inside sRGB',
  p3: 'outside sRGB',
  beyond: 'outside Display P3',
} as const

/** CSS `oklch()` to five decimals: finer than any of the bytes that it renders to. */
export function shortOklch({ l, c, h, alpha }: Oklch): string {
  const body = `${short(l, 5)} ${short(c, 5)} ${short(h, 3)}`
  return alpha === 1 ? `oklch(${body})` : `oklch(${body} / ${short(alpha, 4)})`
}

function short(component: number | null, decimals: number): string {
  return component === null ? 'none' : String(Number(component.toFixed(decimals)))
}
