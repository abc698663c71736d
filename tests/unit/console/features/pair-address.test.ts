import { describe, expect, it } from 'vitest'
import { readPairAddress, writePairAddress } from '#console/features/pairs/pair-address.ts'

const there = (search: string) => readPairAddress(new URLSearchParams(search))

describe('the address of a pair that is to be declared', () => {
  it.each<Parameters<typeof writePairAddress>[0]>([
    { foreground: 'a b/c%', background: 'é&=' },
    { foreground: 'a', background: 'b', use: 'non-text', relation: 'together' },
    { foreground: 'a', background: 'b', use: 'text', backdrop: ['c', 'd'] },
    { foreground: 'a', background: 'b', backdrop: 'unknown' },
  ])('answers %j as it was written', (pair) => {
    expect(there(writePairAddress(pair))).toEqual(pair)
  })

  it('answers empty names where it says none, and leaves out what no pair has', () => {
    expect(there('?use=prose&relation=beside')).toEqual({ foreground: '', background: '' })
  })
})
