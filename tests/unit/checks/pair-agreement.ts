import { deepStrictEqual, equal, ok } from 'node:assert/strict'
import { checkSystem } from '#shared/checks/check-system.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { naiveFindings } from './naive-verdict.ts'
import { randomPairs } from './random-pairs.ts'
import { Dice } from './random-system.ts'

/** Both add and divide the same doubles, if not in the same order. */
const RATIO_TOLERANCE = 1e-12

/** What the pairs were, so that a run can show that it was no idle one. */
export interface PairTally {
  pairs: number
  breaches: number
  /** Pairs with a side that can be seen through. */
  translucent: number
  p3: number
  tight: number
  unknown: number
  /** Pairs within a hundredth of what is required of them. */
  near: number
  widest: number
}

export function emptyPairTally(): PairTally {
  return { pairs: 0, breaches: 0, translucent: 0, p3: 0, tight: 0, unknown: 0, near: 0, widest: 0 }
}

/**
 * Draws pairs and holds each finding against the naive verdict: ratio, requirement, basis, outcome, reason and
 * whether it is tight.
 * @throws AssertionError at the first difference
 */
export function holdPairs(seed: number, count: number, tally: PairTally): void {
  const model = randomPairs(new Dice(seed), count)
  const checked = checkSystem(model)
  if (!checked.ok) throw new Error(JSON.stringify(checked.faults))
  const wanted = new Map(naiveFindings(model).map((one) => [one.identity, one]))
  const isTranslucent = (id: string) =>
    checked.evaluation.resolved.tokens.get(id)!.cells[0]!.color.rendered.a < 255
  const { findings } = verdictOf(checked.evaluation)
  equal(findings.length, count)
  for (const finding of findings) {
    const { identity, ratio, required, basis, outcome, reason, tight, use } = finding
    const { ratio: naiveRatio, ...rest } = wanted.get(identity)!
    deepStrictEqual(
      { identity, required, basis, outcome, reason, tight: tight === true, use },
      rest,
      `${JSON.stringify(finding)} where the naive verdict has ${JSON.stringify(rest)}`,
    )
    const difference = Math.abs(ratio - naiveRatio)
    ok(difference <= RATIO_TOLERANCE, `${identity}: ${ratio} where naively ${naiveRatio}`)
    tally.widest = Math.max(tally.widest, difference)
    tally.pairs++
    if (outcome === 'breach') tally.breaches++
    if (isTranslucent(finding.foreground) || isTranslucent(finding.background)) tally.translucent++
    if (basis === 'p3') tally.p3++
    if (tight) tally.tight++
    if (reason === 'backdrop-unknown') tally.unknown++
    if (Math.abs(ratio - required) < 0.01) tally.near++
  }
}
