import { describe, expect, it } from 'vitest'
import type { SystemModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { system, theme, token, value } from './model-builder.ts'
import { evaluate } from './reading.ts'

function advisoriesOf(model: SystemModel): string[] {
  return verdictOf(evaluate(model)).advisories.map(
    ({ code, token: id, theme: at, state }) => `${code} ${id} ${at} ${state}`,
  )
}

describe('double-flip', () => {
  const mirror = { kind: 'mirror' } as const
  const sand = token('sand', 'oklch(0.6 0.05 80)')
  const flipped = token('label', '#333', { values: { dark: { rest: value('{sand}') } } })

  it('answers an override that aliases a token which the theme’s own rule moves', () => {
    const model = system({ tokens: [sand, flipped], dark: { rule: mirror } })
    expect(advisoriesOf(model)).toEqual(['double-flip label dark rest'])
    const { findings, verdict } = verdictOf(evaluate(model))
    expect([findings.length, verdict]).toEqual([0, 'pass'])
  })

  it('answers it through a chain of aliases', () => {
    const tokens = [
      sand,
      token('dune', '{sand}'),
      token('label', '#333', { values: { dark: { rest: value('{dune}') } } }),
    ]
    expect(advisoriesOf(system({ tokens, dark: { rule: mirror } }))).toEqual([
      'double-flip label dark rest',
    ])
  })

  it('leaves an override on a token that the theme keeps or sets itself, and an alias of the base', () => {
    expect(advisoriesOf(system({ tokens: [sand, flipped] }))).toEqual([])
    const set = token('sand', '#999', { values: { dark: { rest: value('#444') } } })
    expect(advisoriesOf(system({ tokens: [set, flipped], dark: { rule: mirror } }))).toEqual([])
    const plain = [sand, token('label', '{sand}')]
    expect(advisoriesOf(system({ tokens: plain, dark: { rule: mirror } }))).toEqual([])
  })
})

describe('state-invisible', () => {
  const one = (text: string, more: Parameters<typeof token>[2]) =>
    advisoriesOf(system({ themes: [theme('light')], tokens: [token('t', text, more)] }))

  it('answers a state nearer to rest than ΔE2000 2, and leaves one that can be told', () => {
    const step = (lightness: number) => ({
      states: ['hover' as const],
      rules: { states: { hover: { lightness } } },
    })
    expect(one('#777', step(0.005))).toEqual(['state-invisible t light hover'])
    expect(one('#777', step(0.05))).toEqual([])
    // CIEDE2000 between these greys: 1.98 and 2.09.
    const hover = (text: string) => ({
      states: ['hover' as const],
      values: { light: { hover: value(text) } },
    })
    expect(one('#707070', hover('#757575'))).toEqual(['state-invisible t light hover'])
    expect(one('#505050', hover('#565656'))).toEqual([])
  })

  it('answers a disabled grey, which the default rule leaves as it is but for alpha on its own ground', () => {
    expect(one('oklch(0.97 0.01 80)', { states: ['disabled'] })).toEqual([
      'state-invisible t light disabled',
    ])
  })

  it('leaves a state whose rule changes nothing, and names an override that looks like rest', () => {
    expect(one('#777', { states: ['focus'] })).toEqual([])
    const same = { states: ['focus' as const], values: { light: { focus: value('#777') } } }
    expect(one('#777', same)).toEqual(['state-invisible t light focus'])
  })

  it('leaves an alias of a state whose rule changes nothing', () => {
    const tokens = [token('t', '#777', { states: ['focus'] }), token('u', '{t}')]
    expect(advisoriesOf(system({ themes: [theme('light')], tokens }))).toEqual([])
  })

  it('answers colours composited on the ground', () => {
    // Half a white and all of it: on a light ground one is the other.
    const hover = { states: ['hover' as const], values: { light: { hover: value('#ffffff') } } }
    expect(one('rgb(255 255 255 / 0.7)', hover)).toEqual(['state-invisible t light hover'])
  })
})
