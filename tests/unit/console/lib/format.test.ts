import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  countOf,
  formatComponent,
  formatHue,
  formatMoment,
  joinWords,
  startSentence,
  truncateRatio,
} from '#console/lib/format.ts'
import { stateInWords, whereInWords } from '#console/lib/finding-words.ts'

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

describe('figures and words', () => {
  it('answers components with three decimals, hue as a degree, and none where missing', () => {
    expect([formatComponent(0.5), formatHue(359.7), formatHue(null)]).toEqual([
      '0.500',
      '0°',
      'none',
    ])
  })

  it('answers counts as words to twelve, then as figures', () => {
    expect(countOf(0, 'breach', 'breaches')).toBe('no breaches')
    expect(countOf(1, 'breach', 'breaches')).toBe('one breach')
    expect(countOf(12, 'finding')).toBe('twelve findings')
    expect(countOf(13, 'finding')).toBe('13 findings')
  })

  it('answers lists as a sentence has them', () => {
    expect(joinWords([])).toBe('')
    expect(joinWords(['light'])).toBe('light')
    expect(joinWords(['light', 'dark', 'kiosk'])).toBe('light, dark and kiosk')
    expect(startSentence('two breaches')).toBe('Two breaches')
  })

  it('answers a moment of today as today', () => {
    const now = new Date(2026, 10, 24, 18, 0)
    expect(formatMoment(new Date(2026, 10, 24, 9, 12).toISOString(), now)).toBe('today at 09:12')
    expect(formatMoment(new Date(2026, 9, 12, 9, 12).toISOString(), now)).toBe(
      '12 October at 09:12',
    )
  })

  it('answers a state by one word where both sides agree', () => {
    expect(stateInWords('focus/focus')).toBe('focus')
    expect(stateInWords('hover/rest')).toBe('hover on rest')
    expect(whereInWords('light', ['rest/rest', 'focus/focus'])).toBe('light, rest and focus')
  })
})
