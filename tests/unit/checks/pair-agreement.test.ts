import { expect, it } from 'vitest'
import { emptyPairTally, holdPairs } from './pair-agreement.ts'

// 1,000,000 pairs: scripts/agreement-pairs.ts.
it('answers 20,000 random pairs as a naive verdict of its own arithmetic does', () => {
  const tally = emptyPairTally()
  for (let seed = 1; seed <= 400; seed++) holdPairs(seed, 50, tally)
  expect(tally.pairs).toBe(20_000)
  expect(tally.translucent).toBeGreaterThan(5000)
  expect(tally.breaches).toBeGreaterThan(5000)
  for (const seen of [tally.p3, tally.near, tally.tight, tally.unknown]) {
    expect(seen).toBeGreaterThan(10)
  }
}, 60_000)
