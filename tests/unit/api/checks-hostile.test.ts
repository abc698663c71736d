import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { measureCandidate } from '#api/features/checks/measure-candidate.rules.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { createCheckBody } from '#shared/contracts/checks.contract.ts'
import { indexSystem } from '#shared/contracts/governed-system.ts'
import { namesIn, presentFinding } from '#shared/contracts/present-finding.ts'

const token = (id: string, name: string, l: number): GovernedToken => ({
  id,
  name,
  value: { kind: 'color', color: { l, c: 0, h: null, alpha: 1 } },
  states: [],
  values: {},
  locked: false,
})
const model: GovernedSystem = {
  settings: { level: 'AA', p3: true, p3Gates: true },
  states: {},
  prefixes: [],
  themes: [
    {
      id: 'thm_light',
      key: 'light',
      name: 'Light',
      ground: 'tok_paper',
      ink: 'tok_ink',
      rule: { kind: 'keep' },
      gating: true,
    },
  ],
  tokens: [token('tok_paper', 'paper', 1), token('tok_ink', 'ink', 0)],
  pairs: [],
}
const checked = checkSystem(model)
if (!checked.ok) throw new TypeError('The system of this test cannot be resolved')
const head = { index: indexSystem(model), evaluation: checked.evaluation }

const NAMES = [
  'a',
  'b',
  'paper',
  'ink',
  '$root',
  '$value',
  '$type',
  '$ref',
  '$extends',
  '',
  'a.b',
  '{a}',
]
const name = fc.oneof(fc.constantFrom(...NAMES), fc.string({ maxLength: 6, unit: 'binary' }))
const text = fc.oneof(
  fc.constantFrom(
    'color',
    'none',
    '{a}',
    '{paper}',
    '{a.b}',
    '{',
    '#/a/$value',
    '#/a',
    'oklch',
    'srgb',
  ),
  fc.string({ maxLength: 6, unit: 'binary' }),
)
const number = fc.oneof(fc.double({ noNaN: true }), fc.constantFrom(-1, 0, 0.5, 1, 360, 1e308))
const color = fc.record(
  {
    colorSpace: fc.oneof(fc.constantFrom('srgb', 'oklch', 'lab', 'hsl'), text),
    components: fc.array(fc.oneof(number, text), { maxLength: 4 }),
    alpha: fc.oneof(number, text),
    hex: text,
  },
  { requiredKeys: [] },
)
const own = fc.record(
  {
    states: fc.array(fc.oneof(fc.constantFrom('hover', 'rest'), text), { maxLength: 3 }),
    values: fc.dictionary(fc.oneof(fc.constant('light'), name), fc.dictionary(name, text), {
      maxKeys: 2,
    }),
    rules: fc.oneof(fc.constant({ states: { hover: { away: '{b}' } } }), fc.jsonValue()),
  },
  { requiredKeys: [] },
)
const { node } = fc.letrec((tie) => ({
  node: fc.oneof(
    { maxDepth: 4 },
    fc.record(
      {
        $type: fc.oneof(fc.constant('color'), text),
        $value: fc.oneof(color, text),
        $ref: text,
        $extensions: fc.oneof(fc.record({ 'dev.dyewright': fc.oneof(own, fc.jsonValue()) }), text),
      },
      { requiredKeys: [] },
    ),
    fc.dictionary(name, tie('node'), { maxKeys: 4 }),
    fc.jsonValue({ maxDepth: 2 }),
  ),
}))
const body = fc.record(
  {
    tokens: fc.dictionary(name, node, { maxKeys: 5 }),
    mode: fc.constantFrom('merge', 'replace'),
    pairs: fc.array(
      fc.record({
        foreground: fc.constantFrom('a', 'b', 'ink', 'a.b'),
        background: fc.constantFrom('a', 'paper', 'b.a'),
        use: fc.constantFrom('text', 'focus-change', 'link-in-text'),
        backdrop: fc.constantFrom('unknown', ['a'], []),
      }),
      { maxLength: 3 },
    ),
  },
  { requiredKeys: [] },
)

describe('measureCandidate', () => {
  it('answers a measure or faults with pointers for whatever JSON a document holds', () => {
    let measured = 0
    fc.assert(
      fc.property(body, (sent) => {
        const parsed = createCheckBody.safeParse(sent)
        if (!parsed.success) return
        const outcome = measureCandidate(head, parsed.data, { exempts: true })
        if (!outcome.ok) {
          expect(outcome.refusal.faults?.length).toBeGreaterThan(0)
          for (const { pointer } of outcome.refusal.faults ?? []) {
            expect(pointer).toMatch(/^\/(tokens|pairs)/)
          }
          return
        }
        measured += 1
        const { evaluation } = outcome
        for (const finding of verdictOf(evaluation).findings) {
          const wire = presentFinding(finding, namesIn(evaluation.resolved))
          expect(wire.ratio).toBeGreaterThanOrEqual(1)
          expect(wire.ratio).toBeLessThanOrEqual(21)
        }
      }),
      { numRuns: 1500, seed: 20_261_127 },
    )
    expect(measured).toBeGreaterThan(50)
  })
})

describe('measureCandidate refuses', () => {
  const faultsWith = (own: unknown) => {
    const $value = { colorSpace: 'srgb', components: [0, 1, 0] }
    const fresh = { $type: 'color', $value, $extensions: { 'dev.dyewright': own } }
    const parsed = createCheckBody.parse({ tokens: { fresh } })
    const outcome = measureCandidate(head, parsed, { exempts: true })
    return outcome.ok ? [] : outcome.refusal.faults
  }
  const at = '/tokens/fresh/$extensions/dev.dyewright'

  it('what our own extension does not know, at the member and in words', () => {
    const own = { rules: { q: 1 }, states: ['rest'], values: { light: { rest: 'nope' } } }
    expect(faultsWith(own)).toEqual([
      {
        pointer: `${at}/states/0`,
        detail: 'Expected "hover" or "active" or "focus" or "disabled"',
      },
      { pointer: `${at}/values/light/rest`, detail: expect.stringContaining('nope') },
      { pointer: `${at}/rules/q`, detail: 'Unknown member' },
    ])
    expect(faultsWith([])).toEqual([{ pointer: at, detail: 'Expected an object' }])
  })
})
