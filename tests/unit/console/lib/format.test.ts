import { describe, expect, it } from 'vitest'
import {
  formatComponent,
  formatHue,
  formatMoment,
  joinWords,
  startSentence,
} from '#console/lib/format.ts'
import { whereInWords } from '#console/lib/finding-words.ts'

describe('figures and words', () => {
  it('answers components with three decimals, hue as a degree, and none where missing', () => {
    expect([formatComponent(0.5), formatHue(359.7), formatHue(null)]).toEqual([
      '0.500',
      '0°',
      'none',
    ])
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

  it('answers a theme with its states', () => {
    expect(whereInWords('light', ['rest/rest', 'focus/focus'])).toBe('light, rest and focus')
  })
})
