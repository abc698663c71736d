import { passesByGroup } from '#console/lib/lowest-finding.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding } from '#shared/checks/model.ts'

/** The findings of each pair, by its id, as the verdict has them. */
export function findingsByPair(evaluation: Evaluation): ReadonlyMap<string, readonly Finding[]> {
  const byPair = new Map<string, Finding[]>()
  for (const finding of verdictOf(evaluation).findings) {
    for (const pair of finding.pairs) {
      const gathered = byPair.get(pair)
      if (gathered === undefined) byPair.set(pair, [finding])
      else gathered.push(finding)
    }
  }
  return byPair
}

/** How far a finding is over its line, as a factor; infinite where it cannot fall short. */
export function reachOf(finding: Finding): number {
  const { outcome, ratio, required } = finding
  const isFree = outcome === 'exempt' || required === 0 || passesByGroup(finding)
  return isFree ? Number.POSITIVE_INFINITY : ratio / required
}

/** What a pair comes to in one look. */
export type PairOutcome = 'breach' | 'waived' | 'pass' | 'exempt'

const STRICTEST_FIRST = ['breach', 'waived', 'pass', 'exempt'] as const

/** The strictest outcome of a pair's findings; a pair that nothing measures is none. */
export function pairOutcome(findings: readonly Finding[]): PairOutcome | undefined {
  const outcomes = new Set<string>(findings.map(({ outcome }) => outcome))
  if (outcomes.has('known')) return 'breach'
  return STRICTEST_FIRST.find((outcome) => outcomes.has(outcome))
}
