import { describe, expect, it } from 'vitest'
import type { DerivedState, PairModel } from '#shared/checks/model.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { findings } from './reading.ts'

const ALL: DerivedState[] = ['hover', 'active', 'focus', 'disabled']

/** `fg/bg` of each finding of one pair between tokens that list these states. */
function statesOf(
  foreground: readonly DerivedState[],
  background: readonly DerivedState[],
  more: Partial<PairModel> = {},
): string[] {
  const model = system({
    themes: [theme('light')],
    tokens: [
      token('fg', '#333', { states: foreground }),
      token('bg', '#eee', { states: background }),
    ],
    pairs: [pair('fg', 'bg', more)],
  })
  return findings(model).map((one) => `${one.foregroundState}/${one.backgroundState}`)
}

describe('together', () => {
  it('answers each state that either token lists, rest for the one that lacks it', () => {
    expect(statesOf(['hover', 'disabled'], ['hover', 'focus'], { relation: 'together' })).toEqual([
      'rest/rest',
      'hover/hover',
      'disabled/rest',
      'rest/focus',
    ])
  })
})

describe('inside', () => {
  it('answers every state of one on every state of the other', () => {
    expect(statesOf(['focus'], ['focus', 'active'])).toEqual([
      'rest/rest',
      'rest/focus',
      'rest/active',
      'focus/rest',
      'focus/focus',
      'focus/active',
    ])
  })

  it('leaves out a pointed foreground on a background that lists hover and is not pointed at', () => {
    const states = statesOf(['hover', 'active'], ['hover', 'active', 'focus', 'disabled'])
    expect(states.filter((state) => /^(hover|active)/.test(state))).toEqual([
      'hover/hover',
      'hover/active',
      'active/hover',
      'active/active',
    ])
    expect(states.filter((state) => state.startsWith('rest'))).toHaveLength(5)
  })

  it('answers a pointed foreground on a background that does not list hover', () => {
    expect(statesOf(['hover'], ['active'])).toContain('hover/rest')
  })

  it('leaves out a foreground that lists disabled, in another state on a disabled background', () => {
    expect(statesOf(['focus', 'disabled'], ['disabled'])).toEqual([
      'rest/rest',
      'focus/rest',
      'disabled/rest',
      'disabled/disabled',
    ])
    expect(statesOf(['focus'], ['disabled'])).toContain('rest/disabled')
  })
})

it('answers link-in-text with the foreground at rest on every background state', () => {
  const wanted = ['rest/rest', 'rest/hover', 'rest/active', 'rest/focus', 'rest/disabled']
  for (const relation of ['inside', 'together'] as const) {
    expect(statesOf(ALL, ALL, { use: 'link-in-text', relation })).toEqual(wanted)
  }
})

it('leaves a finding only where both its states are listed by the pair, rest always in', () => {
  expect(statesOf(['hover', 'focus'], ['focus'], { states: ['focus'] })).toEqual([
    'rest/rest',
    'rest/focus',
    'focus/rest',
    'focus/focus',
  ])
  expect(statesOf(ALL, ALL, { states: [], relation: 'together' })).toEqual(['rest/rest'])
})

it('answers a pair in its themes only', () => {
  const tokens = [token('fg', '#333')]
  const limited = system({ tokens, pairs: [pair('fg', 'ground', { themes: ['dark'] })] })
  expect(findings(limited).map((one) => one.theme)).toEqual(['dark'])
})
