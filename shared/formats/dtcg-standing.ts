import { isToken } from './dtcg-document.ts'
import { type JsonObject, objectOf } from './dtcg-fault.ts'

/** In place of a token that stands outside the document: only its name and type matter. */
const STAND_IN: JsonObject = {
  $type: 'color',
  $value: { colorSpace: 'srgb', components: [0, 0, 0] },
}

/**
 * A document that is merged over a system may refer to tokens that only the system has. The format knows
 * no such references, so those tokens are put into a copy of the document before it is read.
 * @returns the copy, and the names that were put in
 */
export function withStandingTokens(
  given: JsonObject,
  stands: (name: string) => boolean,
): { readonly document: JsonObject; readonly standIns: ReadonlySet<string> } {
  const document: Group = { ...given }
  const copied = new Set([document])
  const standIns = new Set<string>()
  for (const name of aliasedNames(given)) {
    if (stands(name) && putToken(document, name.split('.'), copied)) standIns.add(name)
  }
  return { document, standIns }
}

type Group = Record<string, unknown>

/** Names in braces anywhere in the document. */
function aliasedNames(document: JsonObject): Set<string> {
  const names = new Set<string>()
  const waiting: unknown[] = [document]
  for (let value = waiting.pop(); value !== undefined; value = waiting.pop()) {
    if (typeof value === 'string') {
      const name = /^\{([^{}]+)\}$/.exec(value)?.[1]
      if (name !== undefined) names.add(name)
    } else if (typeof value === 'object' && value !== null) {
      for (const member of Object.values(value)) if (member !== null) waiting.push(member)
    }
  }
  return names
}

/**
 * Copies a group the first time that something goes into it, so that the caller's document stays as it is and
 * thousands of tokens cost one copy.
 * @returns false where the document has something at that name itself, or a token on the way to it
 */
function putToken(document: Group, path: readonly string[], copied: Set<Group>): boolean {
  let group = document
  for (const [at, segment] of path.entries()) {
    const child = Object.hasOwn(group, segment) ? group[segment] : undefined
    if (isToken(group)) return false
    if (at === path.length - 1) {
      if (child === undefined) group[segment] = STAND_IN
      return child === undefined
    }
    const inner = child === undefined ? {} : objectOf(child)
    if (inner === undefined) return false
    const own = copied.has(inner) ? (inner as Group) : { ...inner }
    copied.add(own)
    group[segment] = own
    group = own
  }
  return false
}
