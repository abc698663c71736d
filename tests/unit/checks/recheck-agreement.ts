import { deepStrictEqual, ok } from 'node:assert/strict'
import { checkSystem } from '#shared/checks/check-system.ts'
import { applyEdits, type SystemEdits } from '#shared/checks/edits.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { Dice, randomEdits, randomSystem } from './random-system.ts'

/** What the sequences met, so that a run can show that it was no idle one. */
export interface RecheckTally {
  sequences: number
  edits: number
  faulty: number
  /** Edits after which measurements are shared with the evaluation before. */
  shared: number
  /** Edits whose reach was counted: of tokens and pairs alone, not reaching a ground or an ink. */
  counted: number
  tokens: number
  tokensComputed: number
  pairs: number
  pairsMeasured: number
}

export function emptyTally(): RecheckTally {
  return {
    sequences: 0,
    edits: 0,
    faulty: 0,
    shared: 0,
    counted: 0,
    tokens: 0,
    tokensComputed: 0,
    pairs: 0,
    pairsMeasured: 0,
  }
}

/** Everything an evaluation says, for a comparison to the last digit. */
export function whole(evaluation: Evaluation) {
  const { resolved, dependents, pairsOf, anyOf } = evaluation
  const sorted = (map: ReadonlyMap<string, readonly (string | number)[]>) =>
    [...map].map(([id, items]) => [id, items.toSorted()] as const).toSorted()
  return {
    verdict: verdictOf(evaluation),
    model: resolved.model,
    positions: [...resolved.positions],
    tokens: [...resolved.tokens.values()].map(({ token: { id }, states, cells }) => [
      id,
      states,
      cells,
    ]),
    anyOf: [...anyOf].toSorted(([a], [b]) => a.localeCompare(b)),
    dependents: sorted(dependents),
    pairsOf: sorted(pairsOf),
  }
}

/** Compares as text first: the same to the last digit, and much quicker than by structure. */
function holdSame(first: unknown, second: unknown): void {
  if (JSON.stringify(first) !== JSON.stringify(second)) deepStrictEqual(first, second)
}

/** Tokens that the edits name, and all that follow from them. */
function reachOf(before: Evaluation, edits: SystemEdits): Set<string> {
  const reach = new Set((edits.tokens?.put ?? []).map(({ id }) => id))
  for (const id of reach) for (const next of before.dependents.get(id) ?? []) reach.add(next)
  return reach
}

/** Edits of tokens that are there, and of pairs; the rest reaches by its nature further than its dependents. */
function isCounted(before: Evaluation, edits: SystemEdits, reach: ReadonlySet<string>): boolean {
  const { tokens, pairs, ...rest } = edits
  const { themes } = before.resolved.model
  return (
    Object.keys(rest).length === 0 &&
    !tokens?.remove?.length &&
    (tokens?.put ?? []).every(({ id }) => before.resolved.tokens.has(id)) &&
    (tokens !== undefined || pairs !== undefined) &&
    !themes.some(({ ground, ink }) => reach.has(ground) || reach.has(ink))
  )
}

/** Holds what an edit computed and measured anew within its reach, by count and by name. */
function holdReach(
  before: Evaluation,
  after: Evaluation,
  edits: SystemEdits,
  tally: RecheckTally,
): void {
  const reach = reachOf(before, edits)
  if (!isCounted(before, edits, reach)) return
  const computed = [...after.resolved.tokens].filter(
    ([id, resolved]) => resolved !== before.resolved.tokens.get(id),
  )
  for (const [id] of computed) ok(reach.has(id), `${id} was computed and does not depend`)
  const known = new Set(before.measures)
  const put = new Set(edits.pairs?.put)
  const measured = after.measures.filter((measure) => !known.has(measure))
  for (const { pair } of measured) {
    const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
    const shows = [pair.foreground, pair.background, ...backdrop].some((id) => reach.has(id))
    ok(shows || put.has(pair), `${pair.id} was measured and shows nothing that moved`)
  }
  tally.counted++
  tally.tokens += after.resolved.tokens.size
  tally.tokensComputed += computed.length
  tally.pairs += after.measures.length
  tally.pairsMeasured += measured.length
}

/**
 * Makes a random system and edits it again and again: each re-check says what a full check of the edited system
 * says, leaves the evaluation before it alone, and computes nothing that does not depend on the edit.
 * @throws AssertionError at the first difference
 */
export function holdSequence(seed: number, steps: number, tally: RecheckTally): void {
  const dice = new Dice(seed)
  const first = checkSystem(randomSystem(dice))
  if (!first.ok) return
  tally.sequences++
  let { evaluation } = first
  for (let step = 0; step < steps; step++) {
    const edits = randomEdits(dice, evaluation.resolved.model)
    const before = step === 0 ? JSON.stringify(whole(evaluation)) : undefined
    const again = recheck(evaluation, edits)
    const full = checkSystem(applyEdits(evaluation.resolved.model, edits))
    if (before !== undefined) ok(JSON.stringify(whole(evaluation)) === before, 'it was changed')
    tally.edits++
    if (!again.ok || !full.ok) {
      deepStrictEqual(again, full)
      tally.faulty++
      continue
    }
    holdSame(whole(again.evaluation), whole(full.evaluation))
    holdReach(evaluation, again.evaluation, edits, tally)
    const old = new Set(evaluation.measures)
    if (again.evaluation.measures.some((one) => old.has(one))) tally.shared++
    evaluation = again.evaluation
  }
}
