import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'

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
  document: JsonObject,
  stands: (name: string) => boolean,
): { readonly document: JsonObject; readonly standIns: ReadonlySet<string> } {
  let whole = document
  const standIns = new Set<string>()
  for (const name of aliasedNames(document)) {
    if (!stands(name)) continue
    const put = withToken(whole, name.split('.'))
    if (put === undefined) continue
    whole = put
    standIns.add(name)
  }
  return { document: whole, standIns }
}

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

/** Nothing where the document has something at that name itself, or a token on the way to it. */
function withToken(
  group: JsonObject,
  [segment, ...rest]: readonly string[],
): JsonObject | undefined {
  if (segment === undefined || isToken(group)) return undefined
  const child = Object.hasOwn(group, segment) ? group[segment] : undefined
  if (rest.length === 0) return child === undefined ? { ...group, [segment]: STAND_IN } : undefined
  const inner = child === undefined ? {} : objectOf(child)
  const put = inner && withToken(inner, rest)
  return put && { ...group, [segment]: put }
}

const isToken = (group: JsonObject) =>
  Object.hasOwn(group, '$value') || Object.hasOwn(group, '$ref')
