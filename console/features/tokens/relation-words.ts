import type { Finding } from '#shared/checks/model.ts'

/** How a finding concerns a token: what lies on the other side, and the follower it comes through. */
export interface Relation {
  /** `on` where the token is the foreground, `under` where it is the background. */
  readonly word: 'on' | 'under' | 'behind'
  readonly other: string
  /** The token that follows it, and stands in the pair for it. */
  readonly through?: string
}

type Sides = Pick<Finding, 'foreground' | 'background'>

/** The relation by ids; `follows` says whether a token's value comes from the one in question. */
export function relationTo(
  token: string,
  { foreground, background }: Sides,
  follows: (id: string) => boolean,
): Relation {
  if (foreground === token) return { word: 'on', other: background }
  if (background === token) return { word: 'under', other: foreground }
  if (follows(foreground)) return { word: 'on', other: background, through: foreground }
  if (follows(background)) return { word: 'under', other: foreground, through: background }
  return { word: 'behind', other: foreground }
}

/** All tokens whose value is computed from this one, near and far. */
export function followersOf(
  token: string,
  dependents: ReadonlyMap<string, readonly string[]>,
): Set<string> {
  const found = new Set<string>()
  const open = [token]
  for (let next = open.pop(); next !== undefined; next = open.pop()) {
    for (const follower of dependents.get(next) ?? []) {
      if (found.has(follower)) continue
      found.add(follower)
      open.push(follower)
    }
  }
  return found
}
