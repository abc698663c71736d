import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { WaiverModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, token, value } from './model-builder.ts'
import { Dice, randomEdits, randomSystem } from './random-system.ts'
import { evaluate } from './reading.ts'
import { emptyTally, holdSequence } from './recheck-agreement.ts'

it('answers sequences of edits as a full check does, within the reach of each edit', () => {
  const tally = emptyTally()
  fc.assert(
    fc.property(fc.integer(), (seed) => holdSequence(seed, 8, tally)),
    { numRuns: 200 },
  )
  expect(tally.edits).toBeGreaterThan(500)
  expect(tally.faulty).toBeGreaterThan(20)
  expect(tally.shared).toBeGreaterThan(200)
  expect(tally.counted).toBeGreaterThan(200)
}, 120_000)

it('answers consequences as a comparison of two whole verdicts does', () => {
  const tally = { moved: 0, breaching: 0, passing: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const dice = new Dice(seed)
      const first = checkSystem(randomSystem(dice))
      if (!first.ok) return
      const again = recheck(first.evaluation, randomEdits(dice, first.evaluation.resolved.model))
      if (!again.ok) return
      const waivers: WaiverModel[] = []
      for (const finding of verdictOf(first.evaluation).findings) {
        if (finding.outcome !== 'breach' || dice.chance(0.7)) continue
        const { foreground, background, kind, required } = finding
        const endsAt = '2030-01-01T00:00:00.000Z'
        const id = `w${waivers.length}`
        waivers.push({
          id,
          foreground,
          background,
          kind,
          required,
          floorRatio: finding.ratio,
          endsAt,
        })
      }
      const findings = (evaluation: Evaluation) =>
        new Map(verdictOf(evaluation, { waivers }).findings.map((one) => [one.identity, one]))
      const before = findings(first.evaluation)
      const after = findings(again.evaluation)
      const got = consequences(first.evaluation, again.evaluation, { waivers })
      const told = new Map(got.map((one) => [one.identity, one]))
      for (const identity of new Set([...before.keys(), ...after.keys()])) {
        const one = told.get(identity)
        const [was, is] = [before.get(identity), after.get(identity)]
        const stays =
          was &&
          is &&
          was.ratio === is.ratio &&
          was.outcome === is.outcome &&
          was.required === is.required
        if (one === undefined) expect(stays).toBeTruthy()
        else expect([one.before, one.after]).toEqual([was, is])
      }
      tally.moved += got.length
      tally.breaching += got.filter(({ newly }) => newly === 'breaching').length
      tally.passing += got.filter(({ newly }) => newly === 'passing').length
    }),
    { numRuns: 200 },
  )
  for (const seen of Object.values(tally)) expect(seen).toBeGreaterThan(0)
}, 60_000)

it('leaves every measurement that an edit does not reach as the same object', () => {
  const before = evaluate(
    system({
      tokens: [token('a', '#777'), token('b', '{a}'), token('c', '#555')],
      pairs: [pair('a', 'ground'), pair('b', 'ground'), pair('c', 'ground')],
    }),
  )
  const a = token('a', '#666')
  const again = recheck(before, { tokens: { put: [a] } })
  if (!again.ok) throw new Error('faulty')
  const same = again.evaluation.measures.map((one, at) => one === before.measures[at])
  expect(same).toEqual([false, false, true])
})

it('answers newly breaching first, then newly passing, then the rest, the furthest short first', () => {
  const before = evaluate(
    system({
      themes: [{ id: 'light', key: 'light', ground: 'ground', ink: 'ink', gating: true }],
      tokens: [token('brand', '#1a1a1a'), token('white', '#fff'), token('pale', '#777')],
      pairs: [
        pair('white', 'brand', { use: 'non-text' }),
        pair('brand', 'ground'),
        pair('ink', 'brand'),
        pair('pale', 'brand'),
      ],
    }),
  )
  const again = recheck(before, { tokens: { put: [token('brand', '#c8c8c8')] } })
  if (!again.ok) throw new Error('faulty')
  const moves = consequences(before, again.evaluation)
  expect(moves.map(({ newly, after }) => [after!.foreground, newly])).toEqual([
    ['brand', 'breaching'],
    ['white', 'breaching'],
    ['ink', 'passing'],
    ['pale', null],
  ])
  expect(moves[0]!.before!.outcome).toBe('pass')
})

it('answers a breach whose pair is taken away as gone, not as passing', () => {
  const before = evaluate(system({ tokens: [token('a', '#777')], pairs: [pair('a', 'ground')] }))
  const again = recheck(before, { pairs: { remove: ['a on ground'] } })
  if (!again.ok) throw new Error('faulty')
  const [light] = consequences(before, again.evaluation)
  expect(light).toMatchObject({ before: { outcome: 'breach' }, newly: null })
  expect(light).not.toHaveProperty('after')
})

it('refuses edits with a fault, naming every one, and leaves the evaluation as it was', () => {
  const before = evaluate(system({ tokens: [token('a', '#777'), token('b', '{a}')] }))
  const again = recheck(before, {
    tokens: { put: [token('c', '{gone}')], remove: ['a'] },
    pairs: { put: [pair('a', 'ground')] },
  })
  expect(
    again.ok ? [] : again.faults.map(({ code, token, pair: id }) => [code, token ?? id]),
  ).toEqual([
    ['reference-missing', 'b'],
    ['reference-missing', 'c'],
    ['reference-missing', 'a on ground'],
  ])
  expect(before.resolved.tokens.has('a')).toBe(true)
})

it('answers a changed override value of one theme in that theme alone', () => {
  const tokens = [token('a', '#777', { values: { dark: { rest: value('#999') } } })]
  const before = evaluate(system({ tokens, pairs: [pair('a', 'ground')] }))
  const edited = token('a', '#777', { values: { dark: { rest: value('#aaa') } } })
  const again = recheck(before, { tokens: { put: [edited] } })
  if (!again.ok) throw new Error('faulty')
  expect(consequences(before, again.evaluation).map(({ after }) => after!.theme)).toEqual(['dark'])
})

it('answers a system that has no theme yet with no finding, and edits of it', () => {
  const before = evaluate(
    system({ themes: [], tokens: [token('a', '#777')], pairs: [pair('a', 'ink')] }),
  )
  const again = recheck(before, { tokens: { put: [token('a', '#888'), token('b', '{a}')] } })
  if (!again.ok) throw new Error('faulty')
  expect(verdictOf(again.evaluation)).toMatchObject({ verdict: 'pass', findings: [] })
  expect([...again.evaluation.resolved.tokens.keys()]).toEqual(['ground', 'ink', 'a', 'b'])
})
