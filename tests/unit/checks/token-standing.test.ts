import { expect, it } from 'vitest'
import { findingsOf, standingOf } from '#shared/checks/token-standing.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { evaluate } from './reading.ts'

const model = system({
  themes: [theme('light')],
  tokens: [
    token('sand', '#8a8a8a'),
    token('label', '{sand}'),
    token('note', '{label}'),
    token('fill', '#ffffff'),
    token('scrim', 'rgb(0 0 0 / 0.1)'),
    token('deep', '#102040', { states: ['disabled'] }),
    token('alone', '#333'),
  ],
  pairs: [
    pair('label', 'fill'),
    pair('note', 'fill', { use: 'non-text' }),
    pair('sand', 'ground', { use: 'non-text' }),
    pair('deep', 'fill', { backdrop: ['scrim'] }),
  ],
})
const evaluation = evaluate(model)

it('answers own pairs, and further pairs of all tokens that follow by alias', () => {
  const standing = standingOf(evaluation)
  const counts = ['sand', 'label', 'note', 'fill', 'alone'].map((id) => {
    const { pairs, aliased } = standing.get(id)!
    return [id, pairs, aliased]
  })
  expect(counts).toEqual([
    ['sand', 1, 2],
    ['label', 1, 1],
    ['note', 1, 0],
    ['fill', 3, 0],
    ['alone', 0, 0],
  ])
})

it('leaves a pair of its own out of those through aliases', () => {
  const tokens = [token('sand', '#8a8a8a'), token('label', '{sand}')]
  const both = system({ themes: [theme('light')], tokens, pairs: [pair('label', 'sand')] })
  expect(standingOf(evaluate(both)).get('sand')).toMatchObject({ pairs: 1, aliased: 0 })
})

it('answers the finding furthest short of its requirement, not the lowest ratio', () => {
  const fill = standingOf(evaluation).get('fill')!
  // Both are the same grey on white; as text it needs 4.5, as a boundary 3.
  expect(fill.lowest).toMatchObject({ foreground: 'label', required: 4.5, outcome: 'breach' })
  expect(standingOf(evaluation).get('alone')).not.toHaveProperty('lowest')
})

it('answers a breach on both tokens, on the background as a breach on it', () => {
  const standing = standingOf(evaluation)
  expect(['label', 'fill', 'note', 'deep'].map((id) => standing.get(id)!.mark)).toEqual([
    'breach',
    'breach-on-it',
    null,
    'exempt',
  ])
  expect(standing.get('fill')!.breaches).toBe(1)
})

it('answers waived instead where a waiver covers', () => {
  const { ratio } = standingOf(evaluation).get('label')!.lowest!
  const endsAt = '2030-01-01T00:00:00.000Z'
  const subject = { foreground: 'label', background: 'fill', kind: 'text' as const }
  const waivers = [{ id: 'w', ...subject, floorRatio: ratio, required: 4.5, endsAt }]
  expect(standingOf(evaluation, { waivers }).get('label')).toMatchObject({
    mark: 'waived',
    waived: 1,
    breaches: 0,
  })
})

it('answers the findings of a token by its part in them', () => {
  const parts = (id: string) =>
    findingsOf(evaluation, id).map(({ as, finding }) => `${as} ${finding.foreground}`)
  expect(parts('sand')).toEqual(['alias label', 'alias note', 'foreground sand'])
  expect(parts('scrim')).toEqual(['backdrop deep', 'backdrop deep'])
  expect(new Set(parts('fill'))).toEqual(
    new Set(['background label', 'background note', 'background deep']),
  )
})

it('leaves findings that another member of their group stands in for out of the lowest', () => {
  const tokens = [token('paper', '#ffffff'), token('inner', '#f0f0f0'), token('outer', '#767676')]
  const ring = { use: 'focus-adjacent', anyOf: 'ring' } as const
  const pairs = [pair('inner', 'paper', ring), pair('outer', 'paper', ring)]
  const bands = evaluate(system({ themes: [theme('light')], tokens, pairs }))
  // #f0f0f0 on white is 1.13 and passes by the other band only; #767676 on white is 4.54 by itself.
  expect(standingOf(bands).get('paper')).toMatchObject({
    mark: null,
    lowest: { foreground: 'outer', outcome: 'pass' },
  })
  expect(standingOf(bands).get('inner')).not.toHaveProperty('lowest')
})

it('answers a pair of a token on itself once, and nothing for a token in no pair', () => {
  const own = evaluate({ ...model, pairs: [pair('sand', 'sand')] })
  expect(standingOf(own).get('sand')).toMatchObject({ pairs: 1, breaches: 1, mark: 'breach' })
  expect(findingsOf(own, 'sand').map(({ as }) => as)).toEqual(['foreground'])
  expect(findingsOf(own, 'alone')).toEqual([])
})
