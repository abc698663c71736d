import { expect, it } from 'vitest'
import { standInFor } from '#shared/checks/any-of.ts'
import type { PairModel, SystemModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, token, value } from './model-builder.ts'
import { evaluate, findings } from './reading.ts'

const RING = system({
  tokens: [token('outer', '#c0c0c0'), token('inner', '#333333'), token('core', '#000000')],
  pairs: [
    pair('outer', 'ground', { anyOf: 'ring', themes: ['light'] }),
    pair('inner', 'ground', { anyOf: 'ring', themes: ['light'] }),
    pair('core', 'ground', { anyOf: 'ring', themes: ['dark'] }),
    pair('core', 'outer', { anyOf: 'other', themes: ['light'] }),
  ],
})

const standIns = (model: SystemModel) => {
  const evaluation = evaluate(model)
  return verdictOf(evaluation).findings.map((finding) => [
    `${finding.foreground} ${finding.reason ?? finding.outcome}`,
    standInFor(evaluation, finding)?.id,
  ])
}

it('answers the member of the group that meets its requirement in the same theme and state', () => {
  expect(standIns(RING)[0]).toEqual(['outer any-of', 'inner on ground'])
})

it('answers the one with the most to spare where several do', () => {
  const pairs = RING.pairs.map((one) => ({ ...one, anyOf: 'ring', themes: ['light'] }))
  expect(standIns({ ...RING, pairs })[0]).toEqual(['outer any-of', 'core on ground'])
})

it('answers nothing where no member does', () => {
  const pairs = RING.pairs.filter(({ foreground }) => foreground !== 'inner')
  expect(standIns({ ...RING, pairs })[0]).toEqual(['outer breach', undefined])
})

/** Members of one group in both themes, each at rest and in hover where it lists that. */
const states = ['hover'] as const
const pale = token('pale', '#b5b5b5', { states, values: { dark: { rest: value('#333a44') } } })
const deep = token('deep', '#333333', {
  states,
  values: { dark: { rest: value('#dddddd'), hover: value('#333a44') } },
})
const band = (id: string, more: Partial<PairModel> = {}) =>
  pair(id, 'ground', { use: 'non-text', anyOf: 'ring', ...more })

const standInAt = (model: SystemModel, place: string) => {
  const evaluation = evaluate(model)
  const finding = verdictOf(evaluation).findings.find(
    (one) => `${one.foreground} ${one.theme} ${one.foregroundState}` === place,
  )!
  return [finding.outcome, finding.reason, standInFor(evaluation, finding)?.id]
}

it('answers by theme and state: a member met elsewhere stands in for nothing', () => {
  const model = system({ tokens: [pale, deep], pairs: [band('pale'), band('deep')] })
  const carried = ['pass', 'any-of', 'deep on ground']
  expect(standInAt(model, 'pale light rest')).toEqual(carried)
  expect(standInAt(model, 'pale light hover')).toEqual(carried)
  expect(standInAt(model, 'pale dark rest')).toEqual(carried)
  expect(standInAt(model, 'pale dark hover')).toEqual(['breach', undefined, undefined])
})

it('answers by the state of the background as well, in each theme', () => {
  const panel = token('panel', '#8a8a8a', {
    states,
    values: {
      light: { hover: value('#ffffff') },
      dark: { rest: value('#8a8a8a'), hover: value('#101010') },
    },
  })
  const at = (dark: string) => {
    const mark = token('mark', '#777777', { values: { dark: { rest: value(dark) } } })
    const other = token('other', '#8f8f8f', { values: { dark: { rest: value('#444444') } } })
    const on = (id: string) => pair(id, 'panel', { use: 'non-text', anyOf: 'ring', minimum: 4 })
    const model = system({ tokens: [panel, mark, other], pairs: [on('other'), on('mark')] })
    return findings(model)
      .filter(({ foreground }) => foreground === 'other')
      .map((one) => `${one.theme} ${one.backgroundState} ${one.reason ?? one.outcome}`)
  }
  expect(at('#8f8f8f')).toEqual([
    'light rest breach',
    'light hover any-of',
    'dark rest breach',
    'dark hover any-of',
  ])
  expect(at('#444444')).toContain('dark hover breach')
})

it('leaves a state that the member lacks to its own requirement', () => {
  const still = { ...deep, states: [], values: { dark: { rest: value('#2c333d') } } }
  const model = system({ tokens: [pale, still], pairs: [band('pale'), band('deep')] })
  for (const place of ['pale dark hover', 'pale light hover', 'pale dark rest']) {
    expect(standInAt(model, place)).toEqual(['breach', undefined, undefined])
  }
  expect(standInAt(model, 'pale light rest')).toEqual(['pass', 'any-of', 'deep on ground'])
})

it('answers each theme by its own requirement', () => {
  const more = { use: 'text' as const }
  const mid = token('deep', '#626262', { states, values: { dark: { rest: value('#8f8f8f') } } })
  const at = (dark: Parameters<typeof system>[0]) =>
    standInAt(
      system({ ...dark, tokens: [pale, mid], pairs: [band('pale', more), band('deep', more)] }),
      'pale dark rest',
    )
  expect(at({})).toEqual(['pass', 'any-of', 'deep on ground'])
  expect(at({ dark: { level: 'AAA' } })).toEqual(['breach', undefined, undefined])
})

it('leaves out a member of which nothing is required, and a pair that is in no group', () => {
  const rest = [token('deep', '#333333'), token('pale', '#b5b5b5')]
  const change = band('deep', { use: 'focus-change', themes: ['light'] })
  const model = system({ tokens: rest, pairs: [band('pale', { themes: ['light'] }), change] })
  expect(standInAt(model, 'pale light rest')).toEqual(['breach', undefined, undefined])
  const alone = { use: 'non-text', themes: ['light'] } as const
  const apart = [pair('pale', 'ground', alone), pair('deep', 'ground', alone)]
  expect(standInAt({ ...model, pairs: apart }, 'pale light rest')).toEqual([
    'breach',
    undefined,
    undefined,
  ])
})

it('answers one that has exactly what it must, and of equals the first', () => {
  const model = system({
    tokens: [token('pale', '#b5b5b5'), token('deep', '#333333'), token('twin', '#333333')],
    pairs: ['pale', 'deep', 'twin'].map((id) => band(id, { themes: ['light'] })),
  })
  expect(standInAt(model, 'pale light rest')[2]).toBe('deep on ground')
  const { ratio } = verdictOf(evaluate(model)).findings[1]!
  const exact = model.pairs
    .slice(0, 2)
    .map((one, at) => (at === 1 ? { ...one, minimum: ratio } : one))
  expect(standInAt({ ...model, pairs: exact }, 'pale light rest')[2]).toBe('deep on ground')
})

it('answers nothing for a finding of a theme that the system has no longer', () => {
  const model = system({ tokens: [pale, deep], pairs: [band('pale'), band('deep')] })
  const evaluation = evaluate(model)
  const [finding] = verdictOf(evaluation).findings
  expect(standInFor(evaluation, finding!)?.id).toBe('deep on ground')
  expect(standInFor(evaluation, { ...finding!, theme: 'gone' })).toBeUndefined()
})
