import { isToken } from './dtcg-document.ts'
import type { DtcgEntry } from './dtcg-entries.ts'
import { type DtcgFaultCode, type JsonObject, objectOf, quoted } from './dtcg-fault.ts'
import type { DtcgLayers } from './dtcg-layers.ts'
import { readAlias, readPointer } from './dtcg-path.ts'

/** What a reference leads to: a whole token by name, a value inside one, or a reason why neither. */
export type Referent =
  | { readonly kind: 'token'; readonly name: string }
  | { readonly kind: 'value'; readonly value: unknown }
  | { readonly kind: 'fault'; readonly code: DtcgFaultCode; readonly detail: string }

/** Follows the references of one document. */
export interface DtcgReferences {
  /** Where `{name}` leads. */
  readonly followAlias: (text: string) => Referent
  /** Where the `$ref` of a token or of a value leads. */
  readonly followPointer: (reference: unknown) => Referent
  /** The value itself, once no reference is left at its top. */
  readonly settled: (value: unknown) => Referent
}

const MOST_STEPS = 128

/** How many references may still be followed: shared by all that one reference leads through. */
interface Budget {
  left: number
}

/** Gives `value` as a reference object, or nothing where it is none. */
export function referenceOf(value: unknown): JsonObject | undefined {
  const object = objectOf(value)
  return object && Object.hasOwn(object, '$ref') ? object : undefined
}

/** Tells an alias, or a failed try at one, from any other text. */
export function isAliasLike(value: unknown): value is string {
  return typeof value === 'string' && value.startsWith('{')
}

interface Document {
  readonly layers: DtcgLayers
  readonly entries: ReadonlyMap<string, DtcgEntry>
}

/** Gives the ways to follow a reference in a document: by alias, by JSON pointer. */
export function createReferences(
  layers: DtcgLayers,
  entries: ReadonlyMap<string, DtcgEntry>,
): DtcgReferences {
  const document = { layers, entries }
  return {
    followAlias: (text) => followAlias(document, text),
    followPointer: (reference) => followPointer(document, reference, fresh()),
    settled: (value) => settled(document, value, fresh()),
  }
}

function followAlias({ layers, entries }: Document, text: string): Referent {
  const path = readAlias(text)
  if (!path) return faulty('alias-syntax', `${quoted(text)} is not {group.token}.`)
  const name = path.join('.')
  if (entries.has(name)) return { kind: 'token', name }
  let place = layers.root
  for (const segment of path) place = layers.childLayers(place, segment)
  return place.length > 0
    ? faulty('alias-not-token', `${quoted(name)} is a group: refer to a token in it.`)
    : faulty('alias-unresolved', `There is no token ${quoted(name)}.`)
}

function followPointer(document: Document, reference: unknown, budget: Budget): Referent {
  const { layers } = document
  const path = readPointer(reference)
  if (!path) {
    return faulty('pointer-syntax', '$ref is a JSON pointer into this document (#/…).')
  }
  let place = layers.root
  let at = 0
  while (at < path.length && !(place[0] && isToken(place[0]))) {
    const next = layers.childLayers(place, path[at]!)
    if (next.length === 0) break
    place = next
    at++
  }
  const rest = path.slice(at)
  const [first] = place
  if (first && isToken(first) && (rest.length === 0 || rest.join('/') === '$value')) {
    const name = path.slice(0, at).join('.')
    return document.entries.has(name)
      ? { kind: 'token', name }
      : faulty('pointer-unresolved', '$ref leads to no token of this document.')
  }
  if (!first || rest.length === 0) {
    return faulty('pointer-unresolved', '$ref leads to a group, not to a token or a value.')
  }
  return inside(document, first, rest, budget)
}

/** Walks members and items from a token or a group, through any reference on the way. */
function inside(
  document: Document,
  from: JsonObject,
  path: readonly string[],
  budget: Budget,
): Referent {
  let value: unknown = from
  for (const segment of path) {
    const top =
      value === from ? ({ kind: 'value', value } as const) : settled(document, value, budget)
    if (top.kind !== 'value') return top
    const holder = top.value
    const isHeld =
      typeof holder === 'object' &&
      holder !== null &&
      Object.hasOwn(holder, segment) &&
      (!Array.isArray(holder) || /^(?:0|[1-9]\d*)$/.test(segment))
    // A token that is a reference has the value of what it refers to.
    if (!isHeld && segment === '$value' && referenceOf(holder)) {
      const { $ref } = holder as JsonObject
      value = { $ref }
      continue
    }
    if (!isHeld) return faulty('pointer-unresolved', `$ref leads nowhere at ${quoted(segment)}.`)
    value = (holder as JsonObject)[segment]
  }
  return settled(document, value, budget)
}

function settled(document: Document, start: unknown, budget: Budget): Referent {
  let value = start
  for (;;) {
    const reference = referenceOf(value)
    if (!reference && !isAliasLike(value)) return { kind: 'value', value }
    if (budget.left-- <= 0) break
    const referent = reference
      ? followPointer(document, reference.$ref, budget)
      : followAlias(document, value as string)
    if (referent.kind !== 'token') return referent
    const { token } = document.entries.get(referent.name)!
    value = Object.hasOwn(token, '$value') ? token.$value : token
  }
  return faulty(
    'alias-circular',
    `The reference leads back to itself, or through more than ${MOST_STEPS} others.`,
  )
}

function fresh(): Budget {
  return { left: MOST_STEPS }
}

function faulty(code: DtcgFaultCode, detail: string): Referent {
  return { kind: 'fault', code, detail }
}
