import type { JsonObject } from './dtcg-fault.ts'

/** Names of tokens for custom properties. */
export interface CssNames {
  readonly nameOf: (property: string) => string
  /** Why a property gives no name, or none that goes with those asked about before. */
  readonly faultOf: (property: string) => string | undefined
  /** Groups and tokens, by custom property. */
  readonly treeOf: (
    tokens: readonly (readonly [property: string, token: JsonObject])[],
  ) => JsonObject
}

type Tree = Record<string, unknown>

/** Takes the leading hyphens off; the others become dots where that is asked for. */
export function createCssNames(hyphensAsDots: boolean): CssNames {
  const tokens = new Map<string, string>()
  const groups = new Map<string, string>()
  const nameOf = (property: string) => {
    const own = property.slice(2)
    return hyphensAsDots ? own.split('-').filter(Boolean).join('.') : own
  }
  const faultOf = (property: string) => {
    const name = nameOf(property)
    const above = groupsOf(name)
    if (name === '' || !name.split('.').every(isSegment)) {
      return 'A name has segments without braces and control characters, none empty or starting with $.'
    }
    if (name.length > LONGEST) return `A name has ${LONGEST} characters at most.`
    const twin = tokens.get(name)
    const holder = above.map((group) => tokens.get(group)).find((one) => one !== undefined)
    const member = groups.get(name)
    tokens.set(name, property)
    for (const group of above) groups.set(group, property)
    if (twin !== undefined) return `${twin} gives the same name, ${name}.`
    if (holder !== undefined) return `${holder} is a token by name, so it cannot hold ${name}.`
    return member === undefined ? undefined : `${name} is a group by name: ${member} lies in it.`
  }
  return { nameOf, faultOf, treeOf: (list) => treeOf(list, nameOf) }
}

const LONGEST = 255
const isSegment = (segment: string) =>
  segment !== '' && segment !== '__proto__' && !/^\$|[{}\p{Cc}]/u.test(segment)

function groupsOf(name: string): string[] {
  const groups: string[] = []
  for (let dot = name.indexOf('.'); dot >= 0; dot = name.indexOf('.', dot + 1)) {
    groups.push(name.slice(0, dot))
  }
  return groups
}

/** Without prototypes: a token may be called anything. */
function treeOf(
  list: readonly (readonly [string, JsonObject])[],
  nameOf: (property: string) => string,
): JsonObject {
  const root = Object.create(null) as Tree
  for (const [property, token] of list) {
    const segments = nameOf(property).split('.')
    const leaf = segments.pop() ?? ''
    let group = root
    for (const segment of segments) {
      const inner = (group[segment] ?? Object.create(null)) as Tree
      group[segment] = inner
      group = inner
    }
    group[leaf] = token
  }
  return root
}
