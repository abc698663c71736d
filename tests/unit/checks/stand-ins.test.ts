import { expect, it } from 'vitest'
import { standInFor } from '#shared/checks/any-of.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, token } from './model-builder.ts'
import { evaluate } from './reading.ts'

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

it('answers nothing for a finding of a theme that the system has no longer', () => {
  const evaluation = evaluate(RING)
  const [finding] = verdictOf(evaluation).findings
  expect(standInFor(evaluation, { ...finding!, theme: 'gone' })).toBeUndefined()
})
