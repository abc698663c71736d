import type { CssBlock } from './css-blocks.ts'
import type { CssDeclaration } from './css-declarations.ts'
import { type CssValue, readCssValue, readLightDark } from './css-values.ts'

/** A property as it comes out of the cascade in one theme. */
export interface CssProperty {
  readonly value: CssValue
  readonly line: number
}

/** Properties by their names. */
export type CssProperties = ReadonlyMap<string, CssProperty>

/** A style sheet sorted by theme. */
export interface CssContexts {
  /** What holds in every theme; where the sheet names the base theme, with what holds in that. */
  readonly base: CssProperties
  /** Name of the base theme; absent where the sheet knows no themes. */
  readonly baseTheme?: string
  /** What else each other theme sets, in the order in which they are first named. */
  readonly themes: ReadonlyMap<string, CssProperties>
  /** What holds only under conditions that are no theme. */
  readonly elsewhere: readonly CssDeclaration[]
}

type Held = CssProperty & { readonly isImportant: boolean }

/**
 * Sorts declarations by the themes in which they hold. The base is the theme that a rule names together with the
 * root, else `light` where the sheet names it (unless only the root can be the dark one), else the root itself.
 */
export function sortByTheme(declarations: readonly CssDeclaration[]): CssContexts {
  const root = new Map<string, Held>()
  const themes = new Map<string, Map<string, Held>>()
  const withRoot = new Set<string>()
  const elsewhere: CssDeclaration[] = []
  for (const declaration of declarations) {
    const { blocks, value } = declaration
    const isRoot = blocks.some(({ kind }) => kind === 'base')
    const named = [...new Set(blocks.flatMap(themeIn))]
    if (!isRoot && named.length === 0) elsewhere.push(declaration)
    const split = readLightDark(value)
    if (isRoot && split) {
      const [light, dark] = split
      put(root, declaration, light)
      put(heldIn(themes, 'light'), declaration, light)
      put(heldIn(themes, 'dark'), declaration, dark)
    } else if (isRoot) put(root, declaration, value)
    for (const name of named) {
      if (isRoot) withRoot.add(name)
      const own = name === 'dark' ? split?.[1] : split?.[0]
      put(heldIn(themes, name), declaration, own ?? value)
    }
  }
  const [together] = withRoot
  const baseTheme = together ?? baseAmong(themes)
  if (baseTheme === undefined) return { base: root, themes, elsewhere }
  const base = laid(root, themes.get(baseTheme))
  themes.delete(baseTheme)
  return { base, baseTheme, themes, elsewhere }
}

const themeIn = (block: CssBlock) => (block.kind === 'theme' ? [block.theme] : [])

function heldIn(themes: Map<string, Map<string, Held>>, name: string): Map<string, Held> {
  const held = themes.get(name) ?? new Map<string, Held>()
  themes.set(name, held)
  return held
}

/** The later one counts, unless the earlier one is important and it is not. */
function put(held: Map<string, Held>, declaration: CssDeclaration, text: string): void {
  const { property, line, isImportant } = declaration
  if (held.get(property)?.isImportant === true && !isImportant) return
  held.set(property, { value: readCssValue(text), line, isImportant })
}

function laid(under: ReadonlyMap<string, Held>, over: ReadonlyMap<string, Held> = new Map()) {
  const both = new Map(under)
  for (const [property, held] of over) {
    if (both.get(property)?.isImportant !== true || held.isImportant) both.set(property, held)
  }
  return both
}

function baseAmong(themes: ReadonlyMap<string, unknown>): string | undefined {
  if (themes.size === 0) return undefined
  return themes.has('light') && !themes.has('dark') ? 'dark' : 'light'
}
