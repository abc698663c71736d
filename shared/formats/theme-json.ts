import { type DtcgColor, writeDtcgSrgb } from './dtcg-color.ts'
import type { ThemeToken } from './theme-tokens.ts'

/** A colour token as a theme file holds it. */
interface ThemeJsonToken {
  readonly $value: DtcgColor
  readonly $description?: string
  readonly $deprecated?: boolean | string
}

interface ThemeJsonGroup {
  [name: string]: ThemeJsonGroup | ThemeJsonToken | 'color'
}

/** A name that cannot stand beside another: DTCG lets a token have no children. */
export interface NestingConflict {
  readonly names: readonly [string, string]
  readonly detail: string
}

/** The document, or every conflict of names. */
export type ThemeJson =
  | { readonly ok: true; readonly document: ThemeJsonGroup }
  | { readonly ok: false; readonly conflicts: readonly NestingConflict[] }

/**
 * Writes a theme at rest as a DTCG document: what ships, as `srgb` components k/255 with hex and alpha.
 * @returns The document; or every pair of names of which one is a token and also a group above the other.
 * @see https://www.designtokens.org/tr/2025.10/format/
 */
export function themeJson(tokens: readonly ThemeToken[]): ThemeJson {
  const root = emptyGroup()
  root.$type = 'color'
  const groups = new Map<string, ThemeJsonGroup>([['', root]])
  const names = new Set(tokens.map(({ name }) => name))
  const conflicts = tokens.flatMap(({ name }) => conflictsOf(name, names))
  if (conflicts.length > 0) return { ok: false, conflicts }
  for (const token of tokens) {
    const rest = token.states.find(({ state }) => state === 'rest')
    if (!rest) throw new TypeError(`${token.name} has no rest state.`)
    const cut = token.name.lastIndexOf('.')
    groupAt(token.name.slice(0, Math.max(0, cut)), groups)[token.name.slice(cut + 1)] = {
      $value: writeDtcgSrgb(rest.rendered),
      ...(token.description === undefined ? {} : { $description: token.description }),
      ...(token.deprecated === undefined ? {} : { $deprecated: token.deprecated }),
    }
  }
  return { ok: true, document: root }
}

function conflictsOf(name: string, names: ReadonlySet<string>): NestingConflict[] {
  const segments = name.split('.')
  return segments.slice(1).flatMap((_, i): NestingConflict[] => {
    const above = segments.slice(0, i + 1).join('.')
    if (!names.has(above)) return []
    return [{ names: [above, name], detail: `${above} is a token, so it cannot hold ${name}.` }]
  })
}

function groupAt(path: string, groups: Map<string, ThemeJsonGroup>): ThemeJsonGroup {
  const waiting: string[] = []
  let at = path
  while (!groups.has(at)) {
    waiting.push(at)
    at = at.slice(0, Math.max(0, at.lastIndexOf('.')))
  }
  let group = groups.get(at)!
  for (const name of waiting.reverse()) {
    const child = emptyGroup()
    group[name.slice(name.lastIndexOf('.') + 1)] = child
    groups.set(name, child)
    group = child
  }
  return group
}

// Without a prototype, a token may be called anything, `__proto__` too.
function emptyGroup(): ThemeJsonGroup {
  return Object.create(null) as ThemeJsonGroup
}
