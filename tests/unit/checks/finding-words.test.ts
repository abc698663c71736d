import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  countOf,
  repairInWords,
  stateInWords,
  truncateRatio,
} from '#shared/checks/finding-words.ts'

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

describe('a repair', () => {
  const nearest = {
    token: 'action.fill',
    theme: 'dark',
    state: 'rest' as const,
    source: false,
    color: {
      colorSpace: 'oklch' as const,
      components: [0.551, 0.128, 243] as [number, number, number],
    },
    hex: '#1478b6',
  }

  it('answers the color whole, with its alpha where it has one, and the place it is for', () => {
    const passes = 'the nearest that passes: oklch(0.551 0.128 243'
    expect(repairInWords({ nearest })).toBe(`${passes}) #1478b6 for action.fill in dark`)
    expect(repairInWords({ nearest: { ...nearest, state: 'hover' } })).toBe(
      `${passes}) #1478b6 for action.fill in dark, hover`,
    )
    const glass = { ...nearest, source: true, color: { ...nearest.color, alpha: 0.5 } }
    expect(repairInWords({ nearest: glass })).toBe(`${passes} / 0.5) #1478b6 for action.fill`)
  })

  it('answers why nothing passes, and nothing where nobody asked', () => {
    const words = (unmended: Parameters<typeof repairInWords>[0]['unmended']) =>
      repairInWords({ unmended })
    expect(words({ reason: 'locked' })).toContain('locked')
    expect(words({ reason: 'budget' })).toContain('not searched to the end')
    expect(words({ reason: 'conflict' })).toContain('no colour of its hue')
    const bound = { needed: 20.25, available: 11.37159 }
    expect(words({ reason: 'conflict', conflict: { bound } })).toMatch(/11\.3715 .* 20\.25/)
    expect(words(undefined)).toBeUndefined()
  })
})
