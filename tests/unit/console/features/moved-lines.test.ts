import { describe, expect, it } from 'vitest'
import { movedGroups } from '#console/features/tokens/moved-lines.ts'
import { followersOf, relationTo } from '#console/features/tokens/relation-words.ts'
import { consequences } from '#shared/checks/consequences.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { SystemModel, TokenModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'

const color = (l: number) => ({ kind: 'color', color: { l, c: 0, h: null, alpha: 1 } }) as const
const token = (id: string, value: TokenModel['value'], states: TokenModel['states'] = []) => ({
  id,
  name: id,
  value,
  states,
  values: {},
})
const pair = (id: string, foreground: string, background: string) =>
  ({ id, foreground, background, use: 'text', relation: 'inside', backdrop: [] }) as const

const model: SystemModel = {
  settings: { level: 'AA', p3: false, p3Gates: false },
  states: {},
  prefixes: [],
  themes: [{ id: 'light', key: 'light', ground: 'deck', ink: 'ink', gating: true }],
  tokens: [
    token('deck', color(0.98)),
    token('ink', color(0.2)),
    token('fill', color(0.5), ['focus']),
    token('edge', { kind: 'alias', token: 'fill' }),
    token('label', color(0.98)),
  ],
  pairs: [pair('p1', 'fill', 'deck'), pair('p2', 'label', 'fill'), pair('p3', 'edge', 'deck')],
}

const before = checkSystem(model)
const movedBy = (l: number) => {
  if (!before.ok) throw new TypeError('the model resolves')
  const put = { ...model.tokens[2]!, value: color(l) }
  const tried = recheck(before.evaluation, { tokens: { put: [put] } })
  if (!tried.ok) throw new TypeError('the trial resolves')
  const followers = followersOf('fill', before.evaluation.dependents)
  const moved = consequences(before.evaluation, tried.evaluation)
  return movedGroups('fill', moved, (id) => followers.has(id))
}

describe('what a trial moves', () => {
  it('answers newly breaching findings with the side they lie on, states of equal figures joined', () => {
    const { breaching, counts } = movedBy(0.75)
    const words = breaching.map(({ relation, states }) => [relation.word, relation.other, states])
    expect(words).toContainEqual(['on', 'deck', ['rest/rest', 'focus/rest']])
    expect(words).toContainEqual(['under', 'label', ['rest/rest', 'rest/focus']])
    expect(counts.breaching).toBeGreaterThan(breaching.length)
    expect(breaching.every(({ ratio, required }) => ratio < required)).toBe(true)
  })

  it('answers what comes through a follower as the follower', () => {
    const through = movedBy(0.75).breaching.find(({ relation }) => relation.through !== undefined)
    expect(through?.relation).toEqual({ word: 'on', other: 'deck', through: 'edge' })
  })

  it('answers what still passes nearest to its line first', () => {
    const { stillPassing, breaching } = movedBy(0.45)
    expect(breaching).toEqual([])
    const ratios = stillPassing.map(({ ratio }) => ratio)
    expect(ratios.length).toBeGreaterThan(0)
    expect(ratios).toEqual([...ratios].sort((a, b) => a - b))
  })

  it('answers a backdrop as what lies behind', () => {
    expect(relationTo('x', { foreground: 'a', background: 'b' }, () => false)).toEqual({
      word: 'behind',
      other: 'a',
    })
  })

  it('answers followers near and far, once each', () => {
    const dependents = new Map([
      ['a', ['b', 'c']],
      ['b', ['d']],
      ['c', ['d']],
    ])
    expect([...followersOf('a', dependents)].sort()).toEqual(['b', 'c', 'd'])
  })
})
