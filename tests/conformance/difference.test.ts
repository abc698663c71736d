import { describe, expect, it } from 'vitest'
import { deltaE2000, deltaEOk } from '#shared/color/difference.ts'
import { oklchOfText } from './color-measures.ts'
import { readVectors } from './read-vectors.ts'

type Triple = readonly [number, number, number]
const vectors = readVectors<{
  readonly tolerance: number
  readonly cases: readonly {
    readonly n: number
    readonly lab1: Triple
    readonly lab2: Triple
    readonly dE00: number
  }[]
  readonly deltaEOk: {
    readonly tolerance: number
    readonly cases: readonly { readonly a: string; readonly b: string; readonly deltaEOK: number }[]
  }
}>('ciede2000')

const labOf = ([l, a, b]: Triple) => ({ l, a, b })

describe('color difference', () => {
  it.each(vectors.cases)('answers pair $n of Sharma, Wu and Dalal both ways', (row) => {
    const there = deltaE2000(labOf(row.lab1), labOf(row.lab2))
    const back = deltaE2000(labOf(row.lab2), labOf(row.lab1))
    expect(Math.abs(there - row.dE00)).toBeLessThanOrEqual(vectors.tolerance)
    expect(back).toBeCloseTo(there, 12)
  })

  it.each(vectors.deltaEOk.cases)('answers ΔE OK of $a and $b', ({ a, b, deltaEOK }) => {
    const difference = deltaEOk(oklchOfText(a), oklchOfText(b))
    expect(Math.abs(difference - deltaEOK)).toBeLessThanOrEqual(vectors.deltaEOk.tolerance)
  })
})
