import { colorsNamed } from 'culori/fn'
import { type ParsedColor, parseWithLibrary } from './color-library.ts'
import type { ColorSpace, Components, SpacedColor } from './to-oklch.ts'

/** A colour as CSS wrote it, or in one sentence why it is none. */
export type CssReading =
  | { readonly ok: true; readonly value: SpacedColor }
  | { readonly ok: false; readonly reason: string }

const LONGEST = 256
const NUMBER = String.raw`[+-]?(?:\d+\.\d+|\d+|\.\d+)(?:e[+-]?\d+)?`
const TERM = new RegExp(`${NUMBER}(?:%|deg|grad|rad|turn)?(?![a-z_%\\d-])|none(?![a-z_\\d-])`, 'g')
const FUNCTION = /^([a-z]+)\(([^()]*)\)$/
const SPACE = /^\s*([a-z\d-]+)\s/
const MATH = /\b(?:calc|min|max|clamp|sin|cos|pow|sqrt|abs|sign|round|mod|rem|env|var|attr)\(/

const SPACES_OF_COLOR: { readonly [name: string]: ColorSpace } = {
  srgb: 'srgb',
  'srgb-linear': 'srgb-linear',
  'display-p3': 'display-p3',
  'display-p3-linear': 'display-p3-linear',
  'a98-rgb': 'a98-rgb',
  'prophoto-rgb': 'prophoto-rgb',
  rec2020: 'rec2020',
  xyz: 'xyz-d65',
  'xyz-d65': 'xyz-d65',
  'xyz-d50': 'xyz-d50',
}

/** Functions that give a colour only together with a page, a reader's settings or other colours. */
const NOT_FIXED: { readonly [name: string]: string } = {
  'color-mix': 'color-mix() is not a fixed colour: write its result.',
  'light-dark': 'light-dark() is two colours: set one per theme.',
  'contrast-color': 'contrast-color() is chosen by the browser: write the colour itself.',
  'device-cmyk': 'device-cmyk() depends on a printer profile: write a screen colour.',
}

/**
 * Reads a fixed CSS Color 4 colour into its own space, clamped as CSS clamps it when parsed:
 * alpha to 0–1, `rgb()` to its range, lightness of lab, lch, oklab and oklch to theirs, chroma and saturation from 0.
 * @param text Any case; at most 256 characters.
 * @returns The components as written, `null` for `none`; or a reason, one sentence.
 * @see https://www.w3.org/TR/css-color-4/#color-syntax
 */
export function readCssColor(text: string): CssReading {
  if (text.length > LONGEST) return refused(`A colour is at most ${LONGEST} characters long.`)
  const css = text
    .replace(/[\t\n\r\f]/g, ' ')
    .trim()
    .toLowerCase()
  if (css === '') return refused('The colour is empty.')
  if (css.startsWith('#')) return readHex(css)
  const call = FUNCTION.exec(css)
  if (call) return readFunction(css, call[1]!, call[2]!)
  return css.includes('(') ? refused(reasonForNested(css)) : readKeyword(css)
}

function readHex(css: string): CssReading {
  const color = parseWithLibrary(css)
  return color ? spaced(color, 'srgb', false) : refused('A hex colour has 3, 4, 6 or 8 hex digits.')
}

function readKeyword(css: string): CssReading {
  if (css === 'currentcolor') {
    return refused('currentcolor depends on where it is used: write the colour itself.')
  }
  const isName = css === 'transparent' || Object.hasOwn(colorsNamed, css)
  const color = isName ? parseWithLibrary(css) : undefined
  return color ? spaced(color, 'srgb', false) : refused(`"${css}" is not a CSS colour.`)
}

function readFunction(css: string, name: string, body: string): CssReading {
  if (/^\s*from\b/.test(body)) return refused('A relative colour (from …) is not a fixed colour.')
  const space = name === 'color' ? SPACES_OF_COLOR[SPACE.exec(body)?.[1] ?? ''] : spaceOf(name)
  if (!space) {
    return refused(
      name === 'color'
        ? 'color() starts with a known colour space.'
        : `${name}() is not a CSS colour.`,
    )
  }
  // The library trips over a term it does not know, so every term is checked before it sees the text.
  const terms = name === 'color' ? body.replace(SPACE, '') : body
  if (!/^[\s,/]*$/.test(terms.replace(TERM, ''))) {
    return refused(`${name}() takes numbers, percentages, angles and none only.`)
  }
  // Two spaces the library lacks or decodes otherwise: it reads their components as srgb, which clamps nothing.
  const isOurs = space === 'display-p3-linear' || space === 'rec2020'
  const color = parseWithLibrary(isOurs ? `color(srgb ${terms})` : css)
  if (!color) return refused(`${name}() is not written as CSS Color 4 asks.`)
  return spaced(color, space, /\/\s*none\s*\)$/.test(css), name)
}

function reasonForNested(css: string): string {
  const name = /^([a-z-]+)\(/.exec(css)?.[1] ?? ''
  if (Object.hasOwn(NOT_FIXED, name)) return NOT_FIXED[name]!
  if (/^[a-z]+\(\s*from\b/.test(css)) return 'A relative colour (from …) is not a fixed colour.'
  const math = MATH.exec(css)
  if (math) return `${math[0]}) is not accepted: write the number itself.`
  return `"${css}" is not a CSS colour.`
}

function spaceOf(name: string): ColorSpace | undefined {
  switch (name) {
    case 'rgb':
    case 'rgba':
      return 'srgb'
    case 'hsla':
      return 'hsl'
    case 'hsl':
    case 'hwb':
    case 'lab':
    case 'lch':
    case 'oklab':
    case 'oklch':
      return name
    default:
      return undefined
  }
}

// What CSS clamps when it parses and the library leaves as written.
function clamped([first, second, third]: Components, name: string): Components {
  if (name.startsWith('rgb')) return [unit(first), unit(second), unit(third)]
  if (name.startsWith('hsl')) return [first, second === null ? null : Math.max(0, second), third]
  return [first, second, third]
}

function unit(component: number | null): number | null {
  return component === null ? null : Math.min(1, Math.max(0, component))
}

function spaced(
  color: ParsedColor,
  space: ColorSpace,
  alphaIsMissing: boolean,
  name = '',
): CssReading {
  const components = clamped(componentsOf(color), name)
  return {
    ok: true,
    value: { space, components, alpha: alphaIsMissing ? null : (color.alpha ?? 1) },
  }
}

function componentsOf(color: ParsedColor): Components {
  switch (color.mode) {
    case 'hsl':
      return [present(color.h), percent(color.s), percent(color.l)]
    case 'hwb':
      return [present(color.h), percent(color.w), percent(color.b)]
    case 'lab':
    case 'oklab':
      return [present(color.l), present(color.a), present(color.b)]
    case 'lch':
    case 'oklch':
      return [present(color.l), present(color.c), present(color.h)]
    case 'xyz50':
    case 'xyz65':
      return [present(color.x), present(color.y), present(color.z)]
    case 'rgb':
    case 'lrgb':
    case 'p3':
    case 'a98':
    case 'prophoto':
      return [present(color.r), present(color.g), present(color.b)]
  }
}

/** The library leaves a missing component out, whatever its types say. */
function present(component: number | undefined): number | null {
  return component ?? null
}

function percent(fraction: number | undefined): number | null {
  return fraction === undefined ? null : fraction * 100
}

function refused(reason: string): CssReading {
  return { ok: false, reason }
}
