import { expect, it } from 'vitest'
import { measuredBy, uncoveredTokens } from '#shared/checks/coverage.ts'
import { pair, system, token, value } from './model-builder.ts'

it('answers tokens in no pair, directly or by an alias or derivation of one that is', () => {
  const model = system({
    tokens: [
      token('palette', '#111111'),
      token('dusk', '#222222'),
      token('hovered', '#333333'),
      token('alias', '{palette}', {
        values: { dark: { rest: value('{dusk}'), hover: value('{hovered}') } },
      }),
      token('seed', '#444444'),
      { ...token('tint', '#000'), value: { kind: 'derived', token: 'seed', lightness: 0.1 } },
      token('veil', '#555555'),
      token('unused', '#666666'),
      token('follower', '{alias}'),
    ],
    pairs: [pair('alias', 'tint', { backdrop: ['veil'] }), pair('ink', 'ground')],
  })
  expect(uncoveredTokens(model).map(({ id }) => id)).toEqual(['unused', 'follower'])
  expect(uncoveredTokens({ ...model, pairs: [] })).toHaveLength(model.tokens.length)
})

it('answers the same text for pairs that measure the same, whatever they ask and for whom', () => {
  const one = pair('a', 'b')
  const other = pair('a', 'b', { level: 'AAA', product: 'kiosk', anyOf: 'ring', states: [] })
  expect(measuredBy(other)).toBe(measuredBy(one))
  for (const members of [{ relation: 'together' }, { use: 'non-text' }, { backdrop: ['c'] }]) {
    expect(measuredBy({ ...one, ...(members as object) })).not.toBe(measuredBy(one))
  }
})

it('answers what lies under no known backdrop by its sides, and a pair on a token that is gone', () => {
  const tokens = ['a', 'b', 'c'].map((id) => token(id, '#777777'))
  const unknown = pair('a', 'b', { backdrop: 'unknown' })
  expect(uncoveredTokens({ tokens, pairs: [unknown] }).map(({ id }) => id)).toEqual(['c'])
  const gone = pair('a', 'gone')
  expect(uncoveredTokens({ tokens, pairs: [gone] }).map(({ id }) => id)).toEqual(['b', 'c'])
})
