import type { Finding, Use } from '#shared/checks/model.ts'
import { lowestFinding, passesByGroup } from '#console/lib/lowest-finding.ts'
import { type Relation, relationTo } from './relation-words.ts'

/** A pair that depends on a token: its lowest finding now, and with what is tried. */
export interface PairStanding {
  readonly key: string
  readonly relation: Relation
  readonly use: Use
  readonly before: Finding
  readonly after: Finding | undefined
}

/** The pairs among findings that depend on the token, furthest short first. */
export function pairStandings(
  token: string,
  before: readonly Finding[],
  after: readonly Finding[] | undefined,
  follows: (id: string) => boolean,
): PairStanding[] {
  const tried = after === undefined ? undefined : byPair(after)
  return [...byPair(before)]
    .flatMap(([key, findings]): PairStanding[] => {
      const lowest = lowestFinding(findings)
      if (lowest === undefined) return []
      const relation = relationTo(token, lowest, follows)
      const now = tried && lowestFinding(tried.get(key) ?? [])
      return [{ key, relation, use: lowest.use, before: lowest, after: now }]
    })
    .sort((a, b) => margin(a.after ?? a.before) - margin(b.after ?? b.before))
}

function byPair(findings: readonly Finding[]): Map<string, Finding[]> {
  const pairs = new Map<string, Finding[]>()
  for (const finding of findings) {
    const key = `${finding.foreground}/${finding.background}/${finding.use}`
    const gathered = pairs.get(key)
    if (gathered === undefined) pairs.set(key, [finding])
    else gathered.push(finding)
  }
  return pairs
}

function margin(finding: Finding): number {
  const { outcome, ratio, required } = finding
  const isFree = outcome === 'exempt' || required === 0 || passesByGroup(finding)
  return isFree ? Infinity : ratio / required
}
