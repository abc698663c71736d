import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { Dice } from './random-system.ts'

const TOKENS = 2000
const PAIRS = 4000

function largeSystem() {
  const dice = new Dice(20)
  const ids = Array.from({ length: TOKENS }, (_, at) => `t${at}`)
  const states = ['hover', 'active', 'focus', 'disabled'] as const
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

function millisecondsOf(run: () => void): number {
  const start = performance.now()
  run()
  return performance.now() - start
}

it('answers a re-check of one token, with its consequences, in a twentieth of a full check', () => {
  const model = largeSystem()
  const first = checkSystem(model)
  if (!first.ok) throw new Error('faulty')
  const full = Math.min(...[1, 2, 3].map(() => millisecondsOf(() => checkSystem(model))))
  const states = ['hover', 'active', 'focus', 'disabled'] as const
  const again = Array.from({ length: 30 }, (_, at) => {
    const put = [token(`t${1000 + at}`, '#336699', { states })]
    return millisecondsOf(() => {
      const edited = recheck(first.evaluation, { tokens: { put } })
      if (!edited.ok || consequences(first.evaluation, edited.evaluation).length === 0) {
        throw new Error('nothing moved')
      }
    })
  }).toSorted((a, b) => a - b)
  expect(again[Math.floor(again.length / 4)]!).toBeLessThan(full / 20)
}, 30_000)
