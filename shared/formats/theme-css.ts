import { formatHex } from '#shared/color/format-color.ts'
import { srgbBytesToP3Bytes } from '#shared/color/p3.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import type { ThemeToken } from './theme-tokens.ts'

/** Two tokens, or a token and a state, that would become one custom property. */
export interface PropertyCollision {
  readonly property: string
  /** Both, as `name` or `name (state)`. */
  readonly names: readonly [string, string]
  readonly detail: string
}

/** The style sheet, or every collision of names. */
export type ThemeCss =
  | { readonly ok: true; readonly css: string }
  | { readonly ok: false; readonly collisions: readonly PropertyCollision[] }

interface Property {
  readonly name: string
  readonly owner: string
  readonly rendered: RenderedColor
}

/**
 * Writes a theme as CSS custom properties: hex, eight digits where translucent, and under
 * `@media (color-gamut: p3)` the already mapped `color(display-p3 …)` of each colour that P3 shows otherwise.
 * Nothing is left for the browser to map.
 * @param shipsP3 Whether Display P3 values ship; false leaves hex alone.
 * @returns The text, in token order; or every collision, since two names can give one property.
 * @see https://www.w3.org/TR/css-variables-1/
 * @see https://www.w3.org/TR/mediaqueries-4/#color-gamut
 */
export function themeCss(tokens: readonly ThemeToken[], shipsP3: boolean): ThemeCss {
  const properties = tokens.flatMap((token) =>
    token.states.map(({ state, rendered }): Property => {
      const isRest = state === 'rest'
      return {
        name: customProperty(isRest ? token.name : `${token.name}.${state}`),
        owner: isRest ? token.name : `${token.name} (${state})`,
        rendered,
      }
    }),
  )
  const collisions = collisionsIn(properties)
  if (collisions.length > 0) return { ok: false, collisions }
  const wide = shipsP3 ? properties.filter(({ rendered }) => differsInP3(rendered)) : []
  const base = `:root {\n${properties.map((each) => `  ${declared(each, hexOf)}\n`).join('')}}\n`
  if (wide.length === 0) return { ok: true, css: base }
  const p3 = wide.map((each) => `    ${declared(each, p3Of)}\n`).join('')
  return { ok: true, css: `${base}\n@media (color-gamut: p3) {\n  :root {\n${p3}  }\n}\n` }
}

/**
 * Names the custom property of a token: dots become hyphens, what an identifier cannot hold is escaped.
 * @param name Dot path, a state's name as its last segment.
 * @see https://www.w3.org/TR/cssom-1/#serialize-an-identifier
 * @example customProperty('action.board.fill') // '--action-board-fill'
 */
export function customProperty(name: string): string {
  return `--${Array.from(name.replaceAll('.', '-'), escaped).join('')}`
}

function escaped(character: string): string {
  const code = character.codePointAt(0)!
  if (code === 0) return '\ufffd'
  if (code < 0x20 || code === 0x7f) return `\\${code.toString(16)} `
  return code >= 0x80 || /[\w-]/.test(character) ? character : `\\${character}`
}

function collisionsIn(properties: readonly Property[]): PropertyCollision[] {
  const owners = new Map<string, string>()
  return properties.flatMap(({ name, owner }): PropertyCollision[] => {
    const first = owners.get(name)
    if (first === undefined) {
      owners.set(name, owner)
      return []
    }
    const detail = `${first} and ${owner} both become ${name}.`
    return [{ property: name, names: [first, owner], detail }]
  })
}

function declared({ name, rendered }: Property, write: (color: RenderedColor) => string): string {
  return `${name}: ${write(rendered)};`
}

function hexOf({ r, g, b, a }: RenderedColor): string {
  return formatHex(r, g, b, a)
}

/** A colour inside sRGB ships as its hex alone, which a P3 screen shows as it is. */
function differsInP3({ r, g, b, p3r, p3g, p3b, gamut }: RenderedColor): boolean {
  if (gamut === 'srgb') return false
  const [red, green, blue] = srgbBytesToP3Bytes(r, g, b)
  return red !== p3r || green !== p3g || blue !== p3b
}

/** Five decimals of k/255 lead back to the same byte. */
function p3Of({ p3r, p3g, p3b, a }: RenderedColor): string {
  const body = [p3r, p3g, p3b].map(fraction).join(' ')
  return a === 255 ? `color(display-p3 ${body})` : `color(display-p3 ${body} / ${fraction(a)})`
}

function fraction(byte: number): string {
  return String(Number((byte / 255).toFixed(5)))
}
