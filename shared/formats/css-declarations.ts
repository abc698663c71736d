import postcss, {
  type AtRule,
  type ChildNode,
  type Container,
  type Declaration,
  type Rule,
} from 'postcss'
import { blockOfAtRule, blockOfSelector, bothBlocks, type CssBlock } from './css-blocks.ts'
import { readCssIdentifier, withPlainEscapes } from './css-identifier.ts'

/** One custom property as it is declared somewhere. */
export interface CssDeclaration {
  /** With its hyphens, escapes decoded. */
  readonly property: string
  /** Without comments and `!important`. */
  readonly value: string
  readonly isImportant: boolean
  /** Counted from 1. */
  readonly line: number
  /** One for each selector of its rule. */
  readonly blocks: readonly CssBlock[]
  /** Selectors and at-rules around it. */
  readonly under: string
}

/** Every custom property of a style sheet in its order, or where the text stops being one. */
export type CssDeclarations =
  | { readonly ok: true; readonly declarations: readonly CssDeclaration[] }
  | { readonly ok: false; readonly line: number; readonly detail: string }

const DEEPEST = 32
/** 20,000 tokens in 8 themes are 160,000 declarations. */
const MOST_PARTS = 400_000
const MOST_SELECTORS = 256
const LONGEST_UNDER = 120

/**
 * Reads the custom properties of a style sheet, with the conditions under which each holds.
 * @see https://www.w3.org/TR/css-variables-1/
 */
export function readCssDeclarations(text: string): CssDeclarations {
  if (partsIn(text) > MOST_PARTS) {
    const detail = `A style sheet has ${MOST_PARTS} blocks, declarations and escapes at most.`
    return { ok: false, line: 1, detail }
  }
  try {
    return { ok: true, declarations: declarationsIn(postcss.parse(withPlainEscapes(text))) }
  } catch (error) {
    if (error instanceof postcss.CssSyntaxError) {
      return { ok: false, line: error.line ?? 1, detail: `${error.reason}.` }
    }
    if (error instanceof TooMuch) return { ok: false, line: error.line, detail: error.message }
    throw error
  }
}

const PARTS = new Set(['{', ';', '\\'].map((character) => character.charCodeAt(0)))

/** Counted before anything is made of the text. */
function partsIn(text: string): number {
  let count = 0
  for (let at = 0; at < text.length; at += 1) if (PARTS.has(text.charCodeAt(at))) count += 1
  return count
}

class TooMuch extends Error {
  constructor(
    readonly line: number,
    detail: string,
  ) {
    super(detail)
  }
}

interface Around {
  readonly node: Container
  /** What the at-rules say. */
  readonly condition: CssBlock
  /** None outside any rule. */
  readonly selectors: readonly string[]
  readonly under: string
  readonly depth: number
}

function declarationsIn(root: Container): CssDeclaration[] {
  const found: CssDeclaration[] = []
  const waiting: { around: Around; node: ChildNode }[] = []
  const enter = (around: Around) => {
    for (const node of [...(around.node.nodes ?? [])].reverse()) waiting.push({ around, node })
  }
  enter({ node: root, condition: { kind: 'base' }, selectors: [], under: '', depth: 0 })
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { around, node } = next
    if (node.type === 'decl') {
      if (node.prop.startsWith('--')) found.push(declarationOf(node, around))
    } else if (node.type !== 'comment') {
      const line = node.source?.start?.line ?? 1
      if (around.depth === DEEPEST) {
        throw new TooMuch(line, `Blocks lie in each other to a depth of ${DEEPEST} at most.`)
      }
      enter(node.type === 'rule' ? insideRule(node, around) : insideAtRule(node, around))
    }
  }
  return found
}

function declarationOf(node: Declaration, { condition, selectors, under }: Around): CssDeclaration {
  // Outside any rule or block of properties nothing is declared.
  const alone = under === '' ? { kind: 'other' as const } : condition
  const blocks =
    selectors.length === 0
      ? [alone]
      : selectors.map((selector) => bothBlocks(condition, blockOfSelector(selector)))
  return {
    property: readCssIdentifier(node.prop),
    value: withoutComments(node.value).trim(),
    isImportant: node.important === true,
    line: node.source?.start?.line ?? 1,
    blocks,
    under,
  }
}

/** A nested selector adds to what its parent says. @see https://www.w3.org/TR/css-nesting-1/ */
function insideRule(node: Rule, { condition, selectors, under, depth }: Around): Around {
  const parents = selectors.length > 0 ? selectors : ['']
  const own = node.selectors.flatMap((selector) =>
    parents.map((parent) =>
      selector.startsWith('&') ? `${parent}${selector.slice(1)}` : `${parent} ${selector}`.trim(),
    ),
  )
  if (own.length > MOST_SELECTORS) {
    const detail = `A rule comes to ${MOST_SELECTORS} selectors at most.`
    throw new TooMuch(node.source?.start?.line ?? 1, detail)
  }
  return {
    node,
    condition,
    selectors: own,
    under: joined(under, node.selector),
    depth: depth + 1,
  }
}

function insideAtRule(node: AtRule, { condition, selectors, under, depth }: Around): Around {
  return {
    node,
    condition: bothBlocks(condition, blockOfAtRule(node.name, node.params)),
    selectors,
    under: joined(under, `@${node.name} ${node.params}`.trim()),
    depth: depth + 1,
  }
}

const joined = (outer: string, inner: string): string =>
  (outer === '' ? inner : `${outer} ${inner}`).slice(0, LONGEST_UNDER)

/** By hand, since a pattern would look for the end of every comment that has none. */
function withoutComments(value: string): string {
  const kept: string[] = []
  let at = 0
  for (let start = value.indexOf('/*'); start >= 0; start = value.indexOf('/*', at)) {
    const end = value.indexOf('*/', start + 2)
    if (end < 0) break
    kept.push(value.slice(at, start))
    at = end + 2
  }
  return [...kept, value.slice(at)].join(' ')
}
