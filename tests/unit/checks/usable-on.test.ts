import { expect, it } from 'vitest'
import type { SystemModel } from '#shared/checks/model.ts'
import { usableOn } from '#shared/checks/usable-on.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { Dice, randomSystem } from './random-system.ts'
import { evaluate, faultsOf } from './reading.ts'

const deck = system({
  themes: [theme('light'), theme('kiosk', { level: 'AAA' })],
  tokens: [
    token('deck', '#ffffff'),
    token('loud', '#000000'),
    token('plain', '#767676'),
    token('soft', '#949494'),
    token('faint', '#cccccc'),
  ],
})

it('answers for which use each token may stand, by the strictest theme', () => {
  const uses = Object.fromEntries(
    usableOn(evaluate(deck), 'deck').map((one) => [one.token, one.uses]),
  )
  // #767676 has 4.54 on white, #949494 3.03: at AAA large text asks for 4.5.
  expect(uses).toMatchObject({
    loud: ['text', 'large-text', 'non-text'],
    plain: ['large-text', 'non-text'],
    soft: ['non-text'],
    faint: [],
  })
  expect(Object.keys(uses)).not.toContain('deck')
})

it('answers where a token has least: the theme and the states', () => {
  const tokens = [
    token('deck', '#ffffff', { states: ['hover'], values: { dark: { hover: value('#888888') } } }),
    token('text', '#000000'),
  ]
  const [text] = usableOn(evaluate(system({ tokens })), 'deck').filter(
    (one) => one.token === 'text',
  )
  expect(text!.lowest).toMatchObject({
    theme: 'dark',
    foregroundState: 'rest',
    backgroundState: 'hover',
  })
})

it('answers as a check of the declared pair does, over random systems', () => {
  let compared = 0
  for (let seed = 1; seed <= 40; seed++) {
    const dice = new Dice(seed)
    const model: SystemModel = { ...randomSystem(dice, 6), pairs: [] }
    if (faultsOf(model).length > 0) continue
    const background = dice.pick(model.tokens).id
    for (const { token: foreground, uses } of usableOn(evaluate(model), background)) {
      const declared = { ...model, pairs: [pair(foreground, background)] }
      const breaches = verdictOf(evaluate(declared)).findings.filter(
        ({ outcome, reason }) => outcome === 'breach' && reason !== 'disabled-floor',
      )
      expect(uses.includes('text')).toBe(breaches.length === 0)
      compared++
    }
  }
  expect(compared).toBeGreaterThan(100)
})

it('answers nothing without a theme, and refuses a token that is not there', () => {
  expect(usableOn(evaluate({ ...deck, themes: [], pairs: [] }), 'deck')).toEqual([])
  expect(() => usableOn(evaluate(deck), 'gone')).toThrow(TypeError)
})
