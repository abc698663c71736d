import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { countOf, stateInWords, truncateRatio } from '#shared/checks/finding-words.ts'

describe('truncateRatio', () => {
  it.each([
    [4.499, 2, '4.49'],
    [4.4999999, 4, '4.4999'],
    [4.35, 2, '4.35'],
    [1.15, 2, '1.15'],
    [21, 2, '21.00'],
    [7, 0, '7'],
    [3.8804, 4, '3.8804'],
  ])('answers %d to %d decimals as %s', (ratio, decimals, text) => {
    expect(truncateRatio(ratio, decimals)).toBe(text)
  })

  it('leaves every ratio at or above the figure it shows, and less than one unit from it', () => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 21, noNaN: true }), (ratio) => {
        const shown = Number(truncateRatio(ratio, 2))
        return shown <= ratio && ratio - shown < 0.01 + 1e-12
      }),
    )
  })

  it('refuses what is no number', () => {
    expect(() => truncateRatio(Number.NaN, 2)).toThrow(TypeError)
  })
})

it('answers counts as words to twelve, then as figures', () => {
  expect(countOf(0, 'breach', 'breaches')).toBe('no breaches')
  expect(countOf(1, 'breach', 'breaches')).toBe('one breach')
  expect(countOf(12, 'finding')).toBe('twelve findings')
  expect(countOf(13, 'finding')).toBe('13 findings')
})

it('answers a state by one word where both sides agree', () => {
  expect(['rest/rest', 'focus/focus'].map(stateInWords)).toEqual(['rest', 'focus'])
  expect(stateInWords('hover/rest')).toBe('hover on rest')
})
