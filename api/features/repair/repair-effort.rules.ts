import type { Finding, SystemModel } from '#shared/checks/model.ts'

/**
 * Work is told by counts, before any of it is done, in evaluations: so many take about five seconds of one core.
 * Beside the colours tried, each step judges every finding and looks at every place anew.
 */
const MOST_AT_ONCE = 60_000
const SEARCH = 2000
const PLACES_A_TOKEN = 2
const JUDGED_AN_EVALUATION = 50
const ITEMS_AN_EVALUATION = 1000
const JUDGEMENTS_A_STEP = 4
const JUDGEMENTS_A_SEARCH = 12

/** A system in counts. */
export interface RepairSize {
  readonly model: SystemModel
  readonly findings: number
  readonly budget: number
}

const judging = (findings: number) => findings / JUDGED_AN_EVALUATION

/** Whether a plan for the gating breaches of a system would keep its caller waiting. */
export function isLongPlan(breaches: readonly Finding[], size: RepairSize): boolean {
  const { model, findings, budget } = size
  const sides = new Set(breaches.flatMap(({ foreground, background }) => [foreground, background]))
  const places = sides.size * PLACES_A_TOKEN
  const items = model.tokens.length + model.pairs.length
  const step = JUDGEMENTS_A_STEP * judging(findings) + places * (items / ITEMS_AN_EVALUATION)
  return Math.min(budget, places * SEARCH) + breaches.length * step > MOST_AT_ONCE
}

/** Whether the search for one token would. */
export function isLongSearch({ findings, budget }: Omit<RepairSize, 'model'>): boolean {
  return budget + JUDGEMENTS_A_SEARCH * judging(findings) > MOST_AT_ONCE
}
