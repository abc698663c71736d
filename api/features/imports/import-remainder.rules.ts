import { isToken } from '#shared/formats/dtcg-document.ts'
import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'
import { mergedDocument } from '#shared/formats/dtcg-merge.ts'
import { EXTENSION, type ResolverBesides } from '#shared/formats/system-resolver.ts'

/** What files brought that the system does not hold. All of it comes back verbatim. */
export interface Remainder {
  /** Tokens of other types, and groups with their own members. */
  readonly document: JsonObject
  /** Of colour tokens, by name in a file and by id in a system: the members that are not read. */
  readonly tokens: Readonly<Record<string, JsonObject>>
  /** What a resolver file says of itself and its parts. */
  readonly resolver?: ResolverBesides
}

/** The remainder as a system keeps it. */
export const readRemainder = (text: string | undefined): Remainder =>
  text === undefined ? { document: {}, tokens: {} } : (JSON.parse(text) as Remainder)

/** One remainder over another, as text that is kept; nothing where nothing is left. */
export function joinedRemainder(before: Remainder, after: Remainder): string | undefined {
  const document = mergedDocument([before.document, after.document])
  const tokens = { ...before.tokens, ...after.tokens }
  const resolver = joinedBesides(before.resolver, after.resolver)
  const isEmpty = [document, tokens, resolver].every((part) => Object.keys(part).length === 0)
  if (isEmpty) return undefined
  const isPlain = Object.keys(resolver).length === 0
  return JSON.stringify({ document, tokens, ...(isPlain ? {} : { resolver }) })
}

/** Member by member, and of extensions vendor by vendor: the newer one wins, the others stay. */
function joinedBesides(before: ResolverBesides = {}, after: ResolverBesides = {}): ResolverBesides {
  const joined = (['root', 'core', 'theme', 'state'] as const).flatMap((part) => {
    const [old, own] = [before[part] ?? {}, after[part] ?? {}]
    const $extensions = { ...objectOf(old.$extensions), ...objectOf(own.$extensions) }
    const members = {
      ...old,
      ...own,
      ...(Object.keys($extensions).length > 0 ? { $extensions } : {}),
    }
    return Object.keys(members).length > 0 ? [[part, members] as const] : []
  })
  return Object.fromEntries(joined)
}

/** Members of a token that are read into the system, and come back from there. */
const READ_MEMBERS = ['$value', '$ref', '$type', '$description', '$deprecated']

/**
 * What is left of a document when its colour tokens are read.
 * @param isRead whether the token of that name was read
 */
export function remainderOf(document: JsonObject, isRead: (name: string) => boolean): Remainder {
  const tokens: [string, JsonObject][] = []
  const left = groupLeft(document, '', { isRead, tokens })
  return { document: left, tokens: Object.fromEntries(tokens) }
}

interface Leaving {
  readonly isRead: (name: string) => boolean
  readonly tokens: [string, JsonObject][]
}

function groupLeft(group: JsonObject, name: string, leaving: Leaving): JsonObject {
  const left: [string, unknown][] = []
  for (const [member, value] of Object.entries(group)) {
    const child = objectOf(value)
    if (child === undefined || (member.startsWith('$') && member !== '$root')) {
      const kept = member === '$extensions' && child ? foreignExtensions(child) : value
      if (kept !== undefined) left.push([member, kept])
      continue
    }
    const path = name === '' ? member : `${name}.${member}`
    if (!isToken(child)) {
      const rest = groupLeft(child, path, leaving)
      if (Object.keys(rest).length > 0) left.push([member, rest])
    } else if (leaving.isRead(path)) {
      const rest = tokenLeft(child)
      if (Object.keys(rest).length > 0) leaving.tokens.push([path, rest])
    } else left.push([member, child])
  }
  return Object.fromEntries(left)
}

function tokenLeft(token: JsonObject): JsonObject {
  const left = Object.entries(token).flatMap(([member, value]): [string, unknown][] => {
    if (member === '$value' && hasNone(value)) return [[member, value]]
    if (READ_MEMBERS.includes(member)) return []
    if (member !== '$extensions') return [[member, value]]
    const kept = foreignExtensions(objectOf(value) ?? {})
    return kept === undefined ? [] : [[member, kept]]
  })
  return Object.fromEntries(left)
}

/** A missing component of another space than OKLCH is lost when the colour is stored: its spelling is kept. */
function hasNone(value: unknown): boolean {
  const color = objectOf(value)
  return (
    color !== undefined &&
    color.colorSpace !== 'oklch' &&
    Array.isArray(color.components) &&
    color.components.includes('none')
  )
}

/** What other vendors say. */
export function foreignExtensions(extensions: JsonObject): JsonObject | undefined {
  const others = Object.entries(extensions).filter(([vendor]) => vendor !== EXTENSION)
  return others.length === 0 ? undefined : Object.fromEntries(others)
}
