/** Where a declaration holds: everywhere, in a theme, or only under a condition that is no theme. */
export type CssBlock =
  | { readonly kind: 'base' }
  | { readonly kind: 'theme'; readonly theme: string }
  | { readonly kind: 'other' }

const BASE: CssBlock = { kind: 'base' }
const OTHER: CssBlock = { kind: 'other' }
/** A longer one is no selector of a theme, and no pattern is to run over it. */
const LONGEST = 255
const ROOT = /^(?::root|html|body|:host|:where\(:root\)|:is\(:root\))/i

/**
 * Tells what a selector says of themes. `:root`, `html`, `body` and `:host` hold everywhere; a theme is named by an
 * attribute whose name says theme, mode or scheme, by a class of the root, or by a class that says theme, light
 * or dark. What a selector excludes (`:not()`) names no theme.
 * @see https://www.w3.org/TR/selectors-4/
 */
export function blockOfSelector(selector: string): CssBlock {
  if (selector.length > LONGEST) return OTHER
  const plain = selector.replaceAll(/:not\([^()]*\)/gi, '').trim()
  const root = ROOT.exec(plain)?.[0] ?? ''
  const rest = plain.slice(root.length).trim()
  if (rest === '') return root === '' ? OTHER : BASE
  const attribute =
    /^\[(?:data-)?[\w-]*(?:theme|mode|scheme)[\w-]*\s*=\s*(?:"([^"]*)"|'([^']*)'|([^\]\s"']+))(?:\s+[is])?\]$/i.exec(
      rest,
    )
  if (attribute) return theme(attribute[1] ?? attribute[2] ?? attribute[3] ?? '')
  const name = /^\.((?:[\w-]|[^\0-\x7f])+)$/.exec(rest)?.[1]
  if (name === undefined) return OTHER
  const bare = name.replace(/^theme-+|-+theme$/i, '')
  const saysTheme = bare !== name || /^(?:light|dark)$/i.test(name) || root !== ''
  return saysTheme ? theme(bare) : OTHER
}

/**
 * Tells what an at-rule adds to the blocks in it: a preferred colour scheme is a theme, layers and `@theme` change
 * nothing, any other condition is no theme.
 * @see https://www.w3.org/TR/mediaqueries-5/#prefers-color-scheme
 */
export function blockOfAtRule(name: string, params: string): CssBlock {
  if (params.length > LONGEST) return OTHER
  const word = name.toLowerCase()
  if (word === 'layer' || word === 'theme') return BASE
  const scheme = /^(?:(?:all|screen)\s+and\s+)?\(\s*prefers-color-scheme\s*:\s*(light|dark)\s*\)$/i
  const chosen = word === 'media' ? scheme.exec(params.trim())?.[1] : undefined
  return chosen === undefined ? OTHER : theme(chosen.toLowerCase())
}

/** Both conditions at once; two different themes never hold together. */
export function bothBlocks(one: CssBlock, other: CssBlock): CssBlock {
  if (one.kind === 'base') return other
  if (other.kind === 'base') return one
  return one.kind === 'theme' && other.kind === 'theme' && one.theme === other.theme ? one : OTHER
}

function theme(name: string): CssBlock {
  const trimmed = name.trim().toLowerCase()
  return trimmed === '' ? OTHER : { kind: 'theme', theme: trimmed }
}
