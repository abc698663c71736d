import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { movedTally, tallyOf, verdictIn } from '#api/features/revisions/head-tally.rules.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { Checked } from '#shared/checks/evaluation.ts'
import type { PairModel, SystemModel, ThemeModel, TokenModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { verdictOf } from '#shared/checks/verdict.ts'

const grey = (l: number) => ({ kind: 'color', color: { l, c: 0, h: null, alpha: 1 } }) as const

const token = (id: string, l: number, members: Partial<TokenModel> = {}): TokenModel => ({
  id,
  name: id,
  value: grey(l),
  states: ['hover', 'disabled'],
  values: {},
  ...members,
})

const theme = (id: string, gating: boolean): ThemeModel => ({
  id,
  key: id,
  ground: 'ground',
  ink: 'ink',
  rule: { kind: id === 'light' ? 'keep' : 'mirror' },
  gating,
})

const SYSTEM: SystemModel = {
  settings: { level: 'AA', p3: false, p3Gates: false },
  states: {},
  prefixes: [],
  themes: [theme('light', true), theme('dark', true)],
  tokens: [
    token('ground', 1, { values: { dark: { rest: grey(0.1) } } }),
    token('ink', 0, { values: { dark: { rest: grey(1) } } }),
    ...[0, 1, 2, 3].map((at) => token(`t${at}`, 0.2 + at / 5)),
  ],
  pairs: [],
}

const ids = fc.constantFrom('t0', 't1', 't2', 't3')
const lightness = fc.integer({ min: 0, max: 20 }).map((step) => step / 20)

const pairs = fc
  .record({
    id: fc.constantFrom('p0', 'p1', 'p2', 'p3', 'p4'),
    foreground: fc.oneof(ids, fc.constant('ink')),
    background: fc.oneof(ids, fc.constant('ground')),
    use: fc.constantFrom('text', 'large-text', 'non-text'),
    relation: fc.constantFrom('inside', 'together'),
    anyOf: fc.option(fc.constantFrom('one', 'two'), { nil: undefined }),
    exempt: fc.option(fc.constant({ kind: 'decorative', reason: 'wave' }), { nil: undefined }),
  })
  .map(({ anyOf, exempt, ...pair }) => ({
    ...pair,
    backdrop: [],
    ...(anyOf ? { anyOf } : {}),
    ...(exempt ? { exempt } : {}),
  })) as fc.Arbitrary<PairModel>

const edits: fc.Arbitrary<SystemEdits> = fc.oneof(
  { weight: 4, arbitrary: pairs.map((pair) => ({ pairs: { put: [pair] } })) },
  {
    weight: 3,
    arbitrary: fc.tuple(ids, lightness).map(([id, l]) => ({ tokens: { put: [token(id, l)] } })),
  },
  fc.constantFrom('p0', 'p1', 'p2').map((id) => ({ pairs: { remove: [id] } })),
  fc.boolean().map((gating) => ({ themes: [theme('light', true), theme('dark', gating)] })),
  fc.constantFrom('AA' as const, 'AAA' as const).map((level) => ({
    settings: { ...SYSTEM.settings, level },
  })),
  fc.constantFrom(1.5, 3).map((disabledFloor) => ({
    settings: { ...SYSTEM.settings, disabledFloor },
  })),
  fc.constant({ themes: [theme('light', true)] }),
)

function evaluated(checked: Checked) {
  if (!checked.ok) throw new Error(checked.faults.map(({ detail }) => detail).join('; '))
  return checked.evaluation
}

describe('movedTally', () => {
  it('answers, edit after edit, what a full check counts', () => {
    fc.assert(
      fc.property(fc.array(edits, { minLength: 1, maxLength: 12 }), (sequence) => {
        let evaluation = evaluated(checkSystem(SYSTEM))
        let tally = tallyOf(evaluation)
        for (const one of sequence) {
          const next = recheck(evaluation, one)
          // Without the dark theme, an override for it is a fault: that edit is refused.
          if (!next.ok) continue
          tally = movedTally(tally, consequences(evaluation, next.evaluation))
          evaluation = next.evaluation
          const { counts, verdict } = verdictOf(evaluated(checkSystem(evaluation.resolved.model)))
          expect(tally.counts).toEqual(counts)
          expect(verdictIn(tally)).toBe(verdict)
        }
      }),
      { numRuns: 300 },
    )
  })
})
