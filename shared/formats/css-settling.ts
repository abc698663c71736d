import type { CssProperties } from './css-contexts.ts'
import { type CssValue, readCssValue } from './css-values.ts'

/** What a property comes to: a token, something else, or a fault. */
export type CssSettled =
  | { readonly kind: 'token'; readonly value: Exclude<CssValue, { kind: 'other' }> }
  | { readonly kind: 'other' | 'fault'; readonly detail: string }

interface Scope {
  readonly own: CssProperties
  readonly base: CssProperties
  /** Whether the sheet declares it anywhere, or a token of that name stands. */
  readonly isKnown: (property: string) => boolean
  readonly stands: (property: string) => boolean
}

/**
 * Follows references within one theme: a property that leads to a colour is a token, one that leads to anything
 * else is none. Each property is walked once, however long the chains are.
 */
export function createSettling(scope: Scope): (property: string) => CssSettled {
  const { own, base, stands } = scope
  const known = new Map<string, CssSettled>()
  const cascaded = (property: string) => {
    const held = own.get(property) ?? base.get(property)
    return held && withFallback(held.value, scope)
  }
  return (start) => {
    const chain: string[] = []
    const met = new Set<string>()
    let end: CssSettled | undefined
    for (let at = start; end === undefined; ) {
      const value = cascaded(at)
      end = known.get(at)
      if (end !== undefined) break
      if (met.has(at)) {
        end = {
          kind: 'fault',
          detail: `It refers to itself, through ${[...met].slice(0, 8).join(', ')}.`,
        }
      } else if (value === undefined) {
        end = stands(at)
          ? { kind: 'token', value: { kind: 'alias', property: at } }
          : { kind: 'other', detail: `It leads to ${at}, which holds in another theme alone.` }
      } else if (value.kind !== 'alias') {
        end =
          value.kind === 'color'
            ? { kind: 'token', value }
            : { kind: 'other', detail: `${value.why}.` }
        known.set(at, end)
        break
      } else {
        met.add(at)
        chain.push(at)
        at = value.property
      }
    }
    for (const property of chain) {
      const value = cascaded(property)
      const isAlias = end.kind === 'token' && value?.kind === 'alias'
      known.set(property, isAlias ? { kind: 'token', value } : end)
    }
    return known.get(start) ?? end
  }
}

/** The fallback counts where the sheet has no such property at all. */
function withFallback(given: CssValue, { isKnown }: Scope): CssValue {
  let value = given
  while (value.kind === 'alias' && !isKnown(value.property)) {
    const { property, fallback } = value
    value =
      fallback === undefined
        ? { kind: 'other', why: `It refers to ${property}, which the style sheet does not declare` }
        : readCssValue(fallback)
  }
  return value
}
