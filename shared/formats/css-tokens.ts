import type { Oklch } from '#shared/color/oklch.ts'
import { type CssContexts, type CssProperties, sortByTheme } from './css-contexts.ts'
import { readCssDeclarations } from './css-declarations.ts'
import { createCssNames } from './css-names.ts'
import { type CssSettled, createSettling } from './css-settling.ts'
import { writeDtcgColor } from './dtcg-color.ts'
import type { JsonObject } from './dtcg-fault.ts'

/** Something at a line of a style sheet, counted from 1. */
export interface CssNote {
  readonly line: number
  /** Custom property, hyphens and all; absent where the text itself is broken. */
  readonly property?: string
  /** One sentence. */
  readonly detail: string
}

/** The colours of a style sheet as a token document, or every fault. */
export type CssTokens =
  | {
      readonly ok: true
      /** A DTCG token document; a resolver document with the modifier `theme` where the sheet has themes. */
      readonly document: JsonObject
      /** Properties that are no tokens, in the order of the sheet. */
      readonly leftOut: readonly CssNote[]
    }
  | { readonly ok: false; readonly faults: readonly CssNote[] }

/** How a style sheet is read. */
export interface CssTokensOptions {
  /** `--action-board` becomes `action.board` instead of `action-board`. */
  readonly hyphensAsDots?: boolean
  /** Whether a token of that name stands where the sheet is to be merged; then it may be referred to. */
  readonly stands?: (name: string) => boolean
}

/**
 * Reads the custom properties of a style sheet as tokens: fixed colours, and `var()` as an alias. What else there is
 * in it, lengths, mixes, rules of components, is left out and listed.
 * @param text A style sheet.
 * @see https://www.w3.org/TR/css-variables-1/
 * @example readCssTokens(':root { --sea: #036; --link: var(--sea) }')
 */
export function readCssTokens(text: string, options: CssTokensOptions = {}): CssTokens {
  const read = readCssDeclarations(text)
  if (!read.ok) return { ok: false, faults: [{ line: read.line, detail: read.detail }] }
  const contexts = sortByTheme(read.declarations)
  const gathered = gather(contexts, options)
  if (gathered.faults.length > 0) return { ok: false, faults: gathered.faults }
  const elsewhere = contexts.elsewhere.map(({ line, property, under }) => ({
    line,
    property,
    detail: `It holds only under ${under === '' ? 'no rule' : under}.`,
  }))
  const leftOut = [...gathered.leftOut, ...elsewhere].sort((a, b) => a.line - b.line)
  return { ok: true, document: documentOf(contexts, gathered.trees), leftOut }
}

interface Gathered {
  readonly faults: CssNote[]
  readonly leftOut: CssNote[]
  /** The base first, then each theme. */
  readonly trees: JsonObject[]
}

function gather({ base, themes }: CssContexts, options: CssTokensOptions): Gathered {
  const names = createCssNames(options.hyphensAsDots === true)
  const stands = (property: string) => options.stands?.(names.nameOf(property)) === true
  const declared = new Set([base, ...themes.values()].flatMap((held) => [...held.keys()]))
  const isKnown = (property: string) => declared.has(property) || stands(property)
  const faults: CssNote[] = []
  const leftOut: CssNote[] = []
  const settled = (own: CssProperties) => {
    const settle = createSettling({ own, base, isKnown, stands })
    return [...own].map(([property, { line }]) => ({ property, line, ...settle(property) }))
  }
  const inBase = settled(base)
  const tokens = new Set(inBase.flatMap((each) => (each.kind === 'token' ? each.property : [])))
  const treeOf = (properties: readonly Settled[], lacks: (one: Settled) => CssNote | undefined) => {
    const colors: Settled[] = []
    for (const one of properties) {
      const { line, property, kind } = one
      const lacking = kind === 'token' ? lacks(one) : undefined
      if (lacking) faults.push(lacking)
      else if (kind === 'token') colors.push(one)
      else (kind === 'fault' ? faults : leftOut).push({ line, property, detail: one.detail })
    }
    return names.treeOf(colors.map((one) => [one.property, tokenOf(one, names.nameOf)]))
  }
  for (const { line, property } of inBase) {
    const detail = tokens.has(property) ? names.faultOf(property) : undefined
    if (detail !== undefined) faults.push({ line, property, detail })
  }
  const trees = [treeOf(inBase, () => undefined)]
  for (const [theme, own] of themes) {
    trees.push(
      treeOf(settled(own), ({ line, property }) =>
        tokens.has(property)
          ? undefined
          : { line, property, detail: `It is a colour in ${theme} and none in the base.` },
      ),
    )
  }
  return { faults, leftOut, trees }
}

type Settled = CssSettled & { readonly property: string; readonly line: number }

function tokenOf(settled: Settled, nameOf: (property: string) => string): JsonObject {
  if (settled.kind !== 'token') throw new TypeError(`${settled.property} is no token`)
  const { value } = settled
  return {
    $type: 'color',
    $value: value.kind === 'alias' ? `{${nameOf(value.property)}}` : written(value.color),
  }
}

const TURN = 360

function written(color: Oklch) {
  const { h } = color
  return writeDtcgColor(h === null ? color : { ...color, h: ((h % TURN) + TURN) % TURN })
}

function documentOf(
  { baseTheme, themes }: CssContexts,
  [base = {}, ...trees]: readonly JsonObject[],
): JsonObject {
  if (baseTheme === undefined || themes.size === 0) return base
  const contexts = [...themes.keys()].map((theme, at) => [theme, [trees[at]]])
  return {
    version: '2025.10',
    sets: { core: { sources: [base] } },
    modifiers: {
      theme: { default: baseTheme, contexts: Object.fromEntries([[baseTheme, []], ...contexts]) },
    },
    resolutionOrder: [{ $ref: '#/sets/core' }, { $ref: '#/modifiers/theme' }],
  }
}
