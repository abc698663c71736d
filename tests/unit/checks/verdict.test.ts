import { describe, expect, it } from 'vitest'
import { meetAnyOf } from '#shared/checks/any-of.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { Finding, PairModel, SystemModel } from '#shared/checks/model.ts'
import { colorOf } from '#shared/checks/resolved.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { relativeLuminance, relativeLuminanceP3 } from '#shared/color/luminance.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { evaluate, findings } from './reading.ts'

const LIGHT = [theme('light')]
const exempt = { kind: 'decorative' as const, reason: 'drawn' }

/** WCAG 2.2's ratio of two luminances, written out; in P3 the same formula, at most 21. */
const ratioOf = (one: number, other: number) =>
  Math.min(21, (Math.max(one, other) + 0.05) / (Math.min(one, other) + 0.05))

function light(pairs: readonly PairModel[], more: Parameters<typeof system>[0] = {}): SystemModel {
  return system({ themes: LIGHT, tokens: [token('grey', '#8a8a8a')], pairs, ...more })
}

describe('rows', () => {
  const states = ['hover', 'active', 'focus'] as const
  const model = (p3Gates: boolean) =>
    system({
      settings: { p3: true, p3Gates },
      tokens: [
        token('vivid', 'oklch(0.6 0.3 140)', {
          states,
          values: { dark: { rest: value('oklch(0.75 0.3 20)'), hover: value('#ffffff') } },
        }),
        token('plain', '#224466', { states: ['hover', 'focus'] }),
      ],
      pairs: [
        pair('vivid', 'ground'),
        pair('vivid', 'plain', { relation: 'together' }),
        pair('plain', 'vivid', { use: 'non-text' }),
      ],
    })

  const expected = (one: Finding, of: SystemModel, p3Gates: boolean) => {
    const { resolved } = evaluate(of)
    const read = (side: 'foreground' | 'background') =>
      colorOf(resolved, { token: one[side], theme: one.theme, state: one[`${side}State`] }).rendered
    const [fg, bg] = [read('foreground'), read('background')]
    const srgb = ratioOf(relativeLuminance(fg.r, fg.g, fg.b), relativeLuminance(bg.r, bg.g, bg.b))
    const isWide = fg.gamut !== 'srgb' || bg.gamut !== 'srgb'
    const p3 = ratioOf(
      relativeLuminanceP3(fg.p3r, fg.p3g, fg.p3b),
      relativeLuminanceP3(bg.p3r, bg.p3g, bg.p3b),
    )
    const isLower = p3Gates && isWide && p3 < srgb
    return {
      ratios: isWide ? { srgb, p3 } : { srgb },
      ratio: isLower ? p3 : srgb,
      basis: isLower ? 'p3' : 'srgb',
      outcome: (isLower ? p3 : srgb) >= one.required ? 'pass' : 'breach',
      rendered: {
        foreground: formatHex(fg.r, fg.g, fg.b),
        background: formatHex(bg.r, bg.g, bg.b),
      },
      identity: [
        `${one.foreground}/${one.background}/ground/${one.kind}/${one.theme}`,
        `${one.foregroundState}/${one.backgroundState}`,
      ].join('/'),
    }
  }

  it.each([true, false])(
    'answers every theme and state by its own colors, on both bases, P3 gating: %s',
    (p3Gates) => {
      const of = model(p3Gates)
      const all = findings(of)
      // By hand: 4 states on the ground; together 4; 3 × 4 inside, without hover on rest and on focus; two themes.
      expect(all).toHaveLength(2 * (4 + 4 + 10))
      for (const one of all) expect(one).toMatchObject(expected(one, of, p3Gates))
      expect(new Set(all.map(({ basis }) => basis))).toEqual(
        new Set(p3Gates ? ['srgb', 'p3'] : ['srgb']),
      )
      expect(new Set(all.map(({ identity }) => identity)).size).toBe(all.length)
      expect(new Set(all.map(({ outcome }) => outcome))).toEqual(new Set(['pass', 'breach']))
    },
  )

  it('answers only what is known: no reason, waiver or tightness where there is none', () => {
    const [one] = findings(light([pair('grey', 'ground')]))
    for (const member of ['reason', 'waiver', 'tight']) expect(one).not.toHaveProperty(member)
    expect(one).toMatchObject({ use: 'text', kind: 'text', gating: true, required: 4.5 })
    expect(one!.pairs).toEqual(['grey on ground'])
  })

  it('answers each theme by its own requirement', () => {
    const model = system({
      light: { level: 'AAA' },
      tokens: [token('a', '#555555', { values: { dark: { rest: value('#aaaaaa') } } })],
      pairs: [pair('a', 'ground', { themes: ['dark'] }), pair('a', 'ground', { id: 'both' })],
    })
    const steel = token('a', '#5f5f5f', { values: { dark: { rest: value('#8f8f8f') } } })
    const level = {
      light: { level: 'AAA' },
      tokens: [steel],
      pairs: [pair('a', 'ground')],
    } as const
    const outcomes = findings(system(level)).map((one) => [one.theme, one.outcome])
    expect(outcomes).toEqual([
      ['light', 'breach'],
      ['dark', 'pass'],
    ])
    const required = findings(model).map((one) => [one.theme, one.required, one.pairs.length])
    expect(required).toEqual([
      ['dark', 4.5, 2],
      ['light', 7, 1],
    ])
  })
})

describe('entries', () => {
  it('answers pairs on the same tokens apart by kind, and by ids that read alike', () => {
    const tokens = ['a', 'a b', 'b c', 'c'].map((id) => token(id, '#777777'))
    const pairs = [
      pair('a b', 'c'),
      pair('a', 'b c'),
      pair('a b', 'c', { id: 'line', use: 'non-text' }),
      pair('a b', 'c', { id: 'large', use: 'large-text' }),
    ]
    const model = light(pairs, { tokens })
    expect(findings(model).map((one) => one.pairs)).toEqual([
      ['a b on c', 'large'],
      ['a on b c'],
      ['line'],
    ])
    expect(evaluate(model).subjects.map(({ members }) => members)).toEqual([[0, 3], [1], [2]])
  })

  it('answers of equally strict ones the furthest short, whichever comes first', () => {
    const large = pair('grey', 'ground', { id: 'large', use: 'large-text', minimum: 4 })
    const small = pair('grey', 'ground', { id: 'small' })
    for (const pairs of [
      [large, small],
      [small, large],
    ]) {
      const all = findings(light(pairs))
      expect(all).toHaveLength(1)
      expect(all[0]).toMatchObject({ required: 4.5, use: 'text', pairs: pairs.map(({ id }) => id) })
    }
    const again = pair('grey', 'ground', { id: 'again', use: 'large-text', minimum: 4.5 })
    expect(findings(light([small, again]))[0]).toMatchObject({
      use: 'text',
      pairs: ['small', 'again'],
    })
  })

  it('answers breach before pass and exempt, pass before exempt, in either order', () => {
    const outcomeOf = (...pairs: PairModel[]) => findings(light(pairs)).map((one) => one.outcome)
    const drawn = pair('grey', 'ground', { id: 'drawn', exempt })
    const low = pair('grey', 'ground', { id: 'low', use: 'focus-change' })
    const ring = pair('grey', 'ground', { id: 'ring', use: 'focus-adjacent', minimum: 21 })
    expect([outcomeOf(low, ring), outcomeOf(ring, low)]).toEqual([['breach'], ['breach']])
    const passing = pair('ink', 'ground')
    const drawnInk = pair('ink', 'ground', { id: 'drawn', exempt })
    expect([outcomeOf(passing, drawnInk), outcomeOf(drawnInk, passing)]).toEqual([
      ['pass'],
      ['pass'],
    ])
    const text = pair('grey', 'ground')
    expect([outcomeOf(drawn, text), outcomeOf(text, drawn)]).toEqual([['breach'], ['breach']])
  })

  it('answers each state of merged pairs once, with the pairs that measure it', () => {
    const tokens = [token('label', '#333333', { states: ['hover'] }), token('fill', '#eeeeee')]
    const model = light([pair('label', 'fill'), pair('label', 'fill', { id: 'b', states: [] })], {
      tokens,
    })
    expect(findings(model).map((one) => [one.foregroundState, one.pairs])).toEqual([
      ['rest', ['label on fill', 'b']],
      ['hover', ['label on fill']],
    ])
  })
})

describe('an evaluation', () => {
  it('answers the pairs that show a token, as a side or in the backdrop, each once', () => {
    const tokens = ['a', 'b', 'veil'].map((id) => token(id, '#777777'))
    const { pairsOf } = evaluate(
      light(
        [
          pair('a', 'a', { backdrop: ['veil', 'a'] }),
          pair('b', 'a', { backdrop: 'unknown' }),
          pair('ink', 'ground', { backdrop: ['veil'] }),
        ],
        { tokens },
      ),
    )
    expect(['a', 'b', 'veil', 'ink'].map((id) => pairsOf.get(id))).toEqual([
      [0, 1],
      [1],
      [0, 2],
      [2],
    ])
    expect([...pairsOf.keys()].toSorted()).toEqual(['a', 'b', 'ground', 'ink', 'veil'])
  })

  it('answers every fault of a system that cannot be read, and no evaluation', () => {
    const checked = checkSystem(light([pair('gone', 'ground'), pair('grey', 'lost')]))
    expect(checked).toEqual({
      ok: false,
      faults: ['gone', 'lost'].map((id, at) => ({
        code: 'reference-missing',
        detail: `The pair refers to ${id}, which is missing`,
        pair: ['gone on ground', 'grey on lost'][at],
      })),
    })
  })

  it('answers advisories in the order of the tokens, and none where there is none', () => {
    const still = { states: { hover: { lightness: 0.001 } } }
    const tokens = ['b', 'a'].map((id) => token(id, '#777777', { states: ['hover'], rules: still }))
    const { advisories } = verdictOf(evaluate(light([], { tokens })))
    expect(advisories.map(({ code, token: id }) => [code, id])).toEqual([
      ['state-invisible', 'b'],
      ['state-invisible', 'a'],
    ])
    expect(verdictOf(evaluate(light([]))).advisories).toEqual([])
  })

  it('answers the ratios of breaches alone, by identity', () => {
    const model = light([pair('grey', 'ground'), pair('ink', 'ground')])
    const verdict = verdictOf(evaluate(model))
    const [breach] = verdict.findings
    expect([...breachRatios(verdict)]).toEqual([[breach!.identity, breach!.ratio]])
  })
})

describe('a group', () => {
  const ring = (id: string, more: Partial<PairModel> = {}) =>
    pair(id, 'ground', { use: 'focus-adjacent', anyOf: 'ring', ...more })
  const tokens = [
    token('pale', 'rgb(0 0 0 / 0.4)'),
    token('glass', 'rgb(0 0 0 / 0.5)'),
    token('deep', '#102040'),
  ]
  const model = (more: Partial<PairModel>, other: Partial<PairModel> = {}) =>
    light([ring('pale', other), ring('deep', more)], { tokens })

  it('answers met from exactly the required ratio up', () => {
    const [, deep] = findings(model({}))
    const { ratio } = deep!
    expect(findings(model({ minimum: ratio }))[0]).toMatchObject({ reason: 'any-of' })
    expect(findings(model({ minimum: ratio + 1e-9 }))[0]!.outcome).toBe('breach')
  })

  it('answers the groups that are asked for, or all', () => {
    const { measures } = evaluate(light([ring('pale'), ring('deep', { anyOf: 'b' })], { tokens }))
    const [first] = measures
    const ungrouped = { ...first!, pair: pair('pale', 'ground') }
    expect([...meetAnyOf([...measures, ungrouped], 1).keys()]).toEqual(['ring', 'b'])
    expect([...meetAnyOf(measures, 1, new Set(['b'])).keys()]).toEqual(['b'])
  })

  it('leaves out tightness where another member carries the finding', () => {
    const [alone] = findings(light([ring('glass')], { tokens }))
    const glass = ring('glass', { minimum: alone!.ratio + 1e-9 })
    expect(findings(light([glass], { tokens }))[0]).toMatchObject({
      outcome: 'breach',
      tight: true,
    })
    const [carried] = findings(light([glass, ring('deep')], { tokens }))
    expect(carried).toMatchObject({ outcome: 'pass', reason: 'any-of' })
    expect(carried).not.toHaveProperty('tight')
  })
})
