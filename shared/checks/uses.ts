import type { ContrastKind, Level, Use } from './model.ts'

/**
 * Required ratios by use and level; 0 where a ratio is measured and nothing required.
 * @see https://www.w3.org/TR/WCAG22/ 1.4.3, 1.4.6 (text, large-text), 1.4.11 (non-text, focus-adjacent),
 * 2.4.13 (focus-change), 1.4.1 with technique G183 (link-in-text)
 */
const REQUIRED: Readonly<Record<Use, Readonly<Record<Level, number>>>> = {
  text: { AA: 4.5, AAA: 7 },
  'large-text': { AA: 3, AAA: 4.5 },
  'non-text': { AA: 3, AAA: 3 },
  'focus-adjacent': { AA: 3, AAA: 3 },
  'focus-change': { AA: 0, AAA: 3 },
  'link-in-text': { AA: 3, AAA: 3 },
}

const KINDS: Readonly<Record<Use, ContrastKind>> = {
  text: 'text',
  'large-text': 'text',
  'non-text': 'non-text',
  'focus-adjacent': 'focus',
  'focus-change': 'focus',
  'link-in-text': 'link',
}

/** The ratio that a use requires at a level; 0 where nothing is required. */
export function requiredRatio(use: Use, level: Level): number {
  return REQUIRED[use][level]
}

/** The kind of finding a use makes; it is part of the identity, the use is not. */
export function kindOf(use: Use): ContrastKind {
  return KINDS[use]
}

/** The highest of the levels that hold; absent ones ask for nothing more. */
export function effectiveLevel(...levels: readonly (Level | undefined)[]): Level {
  return levels.includes('AAA') ? 'AAA' : 'AA'
}
