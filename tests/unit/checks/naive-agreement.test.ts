import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { statesOf } from '#shared/checks/resolved.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { NaiveSystem } from './naive-resolution.ts'
import { naiveFindings } from './naive-verdict.ts'
import { Dice, randomSystem } from './random-system.ts'

it('answers every value and finding of random systems as a naive reading of the rules does', () => {
  const tally = { systems: 0, findings: 0, breaches: 0, p3: 0, tight: 0, merged: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const model = randomSystem(new Dice(seed))
      const checked = checkSystem(model)
      if (!checked.ok) return
      const { evaluation } = checked
      const naive = new NaiveSystem(model)
      for (const { id } of model.tokens) {
        const listed = ['rest', ...naive.lists(id)] as const
        expect(statesOf(evaluation.resolved, id)).toEqual(listed)
        for (const [at, theme] of model.themes.entries()) {
          for (const state of listed) {
            const offset = ['rest', 'hover', 'active', 'focus', 'disabled'].indexOf(state)
            const { oklch } = evaluation.resolved.tokens.get(id)!.cells[at * 5 + offset]!.color
            expect({ id, theme: theme.id, state, ...oklch }).toEqual({
              id,
              theme: theme.id,
              state,
              ...naive.R(id, theme.id, state),
            })
          }
        }
      }
      const wanted = new Map(naiveFindings(model).map((one) => [one.identity, one]))
      const { findings, counts } = verdictOf(evaluation)
      expect(findings.map(({ identity }) => identity).toSorted()).toEqual(
        [...wanted.keys()].toSorted(),
      )
      for (const { identity, ratio, required, basis, outcome, reason, tight, use } of findings) {
        const got = { identity, required, basis, outcome, reason, tight: tight === true, use }
        const { ratio: naiveRatio, ...rest } = wanted.get(identity)!
        expect(got).toEqual(rest)
        expect(ratio).toBeCloseTo(naiveRatio, 10)
      }
      tally.systems++
      tally.findings += findings.length
      tally.breaches += counts.breach
      tally.p3 += findings.filter(({ basis }) => basis === 'p3').length
      tally.tight += findings.filter(({ tight }) => tight).length
      tally.merged += findings.filter(({ pairs }) => pairs.length > 1).length
    }),
    { numRuns: 150 },
  )
  for (const seen of Object.values(tally)) expect(seen).toBeGreaterThan(0)
  expect(tally.systems).toBeGreaterThan(40)
}, 60_000)
