import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  LEDGER_SORTS,
  type LedgerEntry,
  placeOf,
  selectEntries,
  startAfter,
} from '#api/features/tokens/ledger.rules.ts'

function entry(at: number, ratio: number | null): LedgerEntry {
  const id = `tok_${String(at).padStart(4, '0')}`
  const lowest = ratio === null ? null : { ratio, required: 4.5 }
  return {
    id,
    name: `n${(at * 7919) % 997}`,
    standing: { mark: null, lowest } as LedgerEntry['standing'],
  }
}

const ledgers = fc
  .array(fc.option(fc.integer({ min: 10, max: 210 }).map((tenths) => tenths / 10)), {
    maxLength: 40,
  })
  .map((ratios) => ratios.map((ratio, at) => entry(at, ratio)))

describe('startAfter', () => {
  it('answers pages that together are the list, whatever is deleted behind them', () => {
    fc.assert(
      fc.property(
        ledgers,
        fc.constantFrom(...LEDGER_SORTS),
        fc.integer({ min: 1, max: 5 }),
        fc.boolean(),
        (ledger, sort, limit, deletes) => {
          let entries = selectEntries(ledger, {}, sort)
          const whole = entries.map(({ id }) => id)
          const seen: string[] = []
          let start = 0
          while (start < entries.length) {
            const page = entries.slice(start, start + limit)
            seen.push(...page.map(({ id }) => id))
            const last = page.at(-1)
            if (last === undefined) break
            const place = placeOf(last)
            if (deletes) entries = entries.filter(({ id }) => id !== last.id)
            start = startAfter(entries, place, sort)
          }
          // Among equals of the sort by lowest, a deleted end of a page may take its equals along.
          if (sort !== 'lowest' || !deletes) expect(seen).toEqual(whole)
          expect(new Set(seen).size).toBe(seen.length)
        },
      ),
    )
  })
})

describe('selectEntries', () => {
  it('answers the furthest short first, and last what nothing is required of', () => {
    const sorted = selectEntries([entry(0, null), entry(1, 9), entry(2, 2)], {}, 'lowest')
    expect(sorted.map(({ id }) => id)).toEqual(['tok_0002', 'tok_0001', 'tok_0000'])
  })
})
