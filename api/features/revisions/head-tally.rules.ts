import type { Consequence } from '#shared/checks/consequences.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { type Finding, OUTCOMES, type Outcome, type Verdict } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'

/** How many findings of a head came out how, and how many of them fail it. */
export interface Tally {
  readonly counts: { readonly [outcome in Outcome]: number }
  readonly gatingBreaches: number
}

/** Counts a whole evaluation. */
export function tallyOf(evaluation: Evaluation): Tally {
  const { counts, findings } = verdictOf(evaluation, { include: 'not-pass' })
  return { counts, gatingBreaches: findings.filter(isGatingBreach).length }
}

/** The tally after what edits moved: in time with the difference, not with the system. */
export function movedTally(tally: Tally, moved: readonly Consequence[]): Tally {
  const counts = { ...tally.counts }
  let { gatingBreaches } = tally
  for (const { before, after } of moved) {
    if (before) counts[before.outcome] -= 1
    if (after) counts[after.outcome] += 1
    gatingBreaches += Number(isGatingBreach(after)) - Number(isGatingBreach(before))
  }
  if (gatingBreaches < 0 || OUTCOMES.some((outcome) => counts[outcome] < 0)) {
    throw new TypeError('What moved is not of the system that was counted')
  }
  return { counts, gatingBreaches }
}

/** A check fails on any gating breach. */
export const verdictIn = ({ gatingBreaches }: Tally): Verdict['verdict'] =>
  gatingBreaches > 0 ? 'fail' : 'pass'

const isGatingBreach = (finding: Finding | undefined): boolean =>
  finding?.gating === true && finding.outcome === 'breach'
