import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { Dice } from './random-system.ts'

const TOKENS = 2000
const PAIRS = 4000
const states = ['hover', 'active', 'focus', 'disabled'] as const

function largeSystem() {
  const dice = new Dice(20)
  const ids = Array.from({ length: TOKENS }, (_, at) => `t${at}`)
  const color = () => `oklch(${dice.next()} ${dice.next() * 0.2} ${dice.next() * 360})`
  return system({
    themes: [
      theme('light'),
      theme('dark', { rule: { kind: 'mirror', chroma: 0.92 } }),
      theme('kiosk', { rule: { kind: 'relative' }, level: 'AAA' }),
    ],
    tokens: ids.map((id, at) =>
      token(id, at > 50 && dice.chance(0.3) ? `{t${dice.upTo(50)}}` : color(), { states }),
    ),
    pairs: Array.from({ length: PAIRS }, (_, at) =>
      pair(dice.pick(ids), dice.pick(ids), { id: `p${at}`, relation: 'together' }),
    ),
  })
}

/** What an edit of one token computes and measures anew: everything else is the same object as before. */
function workOf(first: Evaluation, id: string) {
  const edited = recheck(first, { tokens: { put: [token(id, '#336699', { states })] } })
  if (!edited.ok) throw new Error('faulty')
  const { evaluation } = edited
  const tokens = [...evaluation.resolved.tokens].filter(
    ([key, resolved]) => resolved !== first.resolved.tokens.get(key),
  )
  const pairs = evaluation.measures.filter((measure, at) => measure !== first.measures[at])
  return { tokens: tokens.length, pairs: pairs.length, moved: consequences(first, evaluation) }
}

it('leaves all tokens and pairs that do not depend on an edit as they were', () => {
  const first = checkSystem(largeSystem())
  if (!first.ok) throw new Error('faulty')
  for (let at = 1000; at < 1030; at++) {
    const own = first.evaluation.pairsOf.get(`t${at}`) ?? []
    const work = workOf(first.evaluation, `t${at}`)
    // Nothing follows these tokens, so each is computed alone and only its own pairs are measured.
    expect({ tokens: work.tokens, pairs: work.pairs }).toEqual({ tokens: 1, pairs: own.length })
    expect(work.moved.length > 0).toBe(own.length > 0)
  }
})

it('computes the followers of an edited token again, and measures their pairs', () => {
  const first = checkSystem(largeSystem())
  if (!first.ok) throw new Error('faulty')
  const followers = first.evaluation.dependents.get('t7') ?? []
  const pairs = ['t7', ...followers].flatMap((id) => first.evaluation.pairsOf.get(id) ?? [])
  const work = workOf(first.evaluation, 't7')
  expect(followers.length).toBeGreaterThan(1)
  expect(work).toMatchObject({ tokens: 1 + followers.length, pairs: new Set(pairs).size })
})
