import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { placeOf, startAfter } from '#api/features/tokens/ledger-pages.ts'
import { LEDGER_SORTS, type LedgerEntry, selectEntries } from '#api/features/tokens/ledger.rules.ts'

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
            const place = placeOf(entries, entries.indexOf(last))
            if (place === undefined) break
            if (deletes) entries = entries.filter(({ id }) => id !== last.id)
            start = startAfter(entries, place, sort)
          }
          expect(seen).toEqual(whole)
        },
      ),
    )
  })

  it('answers the rest of the ledger also where ids are not in its order, and its end was deleted', () => {
    // Two processes whose clocks differ make ids that do not sort as the ledger does.
    const made = [3, 9, 4, 8, 5].map((at) => entry(at, null))
    const place = placeOf(made, 1)
    const left = made.filter((_, at) => at !== 1)
    expect(place && startAfter(left, place, 'ledger')).toBe(1)
  })

  it.each([
    ['name', { name: 'zzz' }],
    ['lowest', { standing: { lowest: { ratio: 20, required: 4.5 } } as LedgerEntry['standing'] }],
  ] as const)(
    'answers the rest by %s also where the end of the page has moved on',
    (sort, moved) => {
      const before = selectEntries(
        [1, 2, 3, 4, 5, 6].map((at) => entry(at, at)),
        {},
        sort,
      )
      const place = placeOf(before, 2)
      const after = selectEntries(
        before.map((one, at) => (at === 2 ? { ...one, ...moved } : one)),
        {},
        sort,
      )
      const rest = place && after.slice(startAfter(after, place, sort)).map(({ id }) => id)
      expect(rest).toEqual(expect.arrayContaining(before.slice(3).map(({ id }) => id)))
      for (const { id } of before.slice(0, 2)) expect(rest).not.toContain(id)
    },
  )
})

describe('selectEntries', () => {
  it('answers the furthest short first, and last what nothing is required of', () => {
    const sorted = selectEntries([entry(0, null), entry(1, 9), entry(2, 2)], {}, 'lowest')
    expect(sorted.map(({ id }) => id)).toEqual(['tok_0002', 'tok_0001', 'tok_0000'])
  })
})
