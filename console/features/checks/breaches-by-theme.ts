import type { Evaluation } from '#shared/checks/evaluation.ts'
import { verdictOf } from '#shared/checks/verdict.ts'

/** How many findings breach in each theme, by its id. */
export function breachesByTheme(evaluation: Evaluation): ReadonlyMap<string, number> {
  const counts = new Map<string, number>()
  for (const { theme, outcome } of verdictOf(evaluation).findings) {
    if (outcome === 'breach') counts.set(theme, (counts.get(theme) ?? 0) + 1)
  }
  return counts
}
