import { describe, expect, it } from 'vitest'
import { ENGINE_VERSION, RULE_SET } from '#shared/checks/engine.ts'
import type { Finding, PairModel, SystemModel } from '#shared/checks/model.ts'
import { effectiveLevel, requiredRatio } from '#shared/checks/uses.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { GAMUT_MAP } from '#shared/color/gamut-map.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { evaluate, findings } from './reading.ts'

const LIGHT = [theme('light')]
const GREY = token('grey', '#8a8a8a')

function lightSystem(
  pairs: readonly PairModel[],
  more: Parameters<typeof system>[0] = {},
): SystemModel {
  return system({ themes: LIGHT, tokens: [GREY], pairs, ...more })
}

const outcomes = (all: readonly Finding[]) => all.map(({ outcome, reason }) => [outcome, reason])

it('answers the required ratios of WCAG 2.2 for every use and level', () => {
  const uses = [
    'text',
    'large-text',
    'non-text',
    'focus-adjacent',
    'focus-change',
    'link-in-text',
  ] as const
  expect(uses.map((use) => [requiredRatio(use, 'AA'), requiredRatio(use, 'AAA')])).toEqual([
    [4.5, 7],
    [3, 4.5],
    [3, 3],
    [3, 3],
    [0, 3],
    [3, 3],
  ])
  expect([effectiveLevel('AA', undefined), effectiveLevel('AA', 'AAA', 'AA')]).toEqual([
    'AA',
    'AAA',
  ])
})

it('answers the highest of the system’s, the theme’s and the pair’s level, and of a minimum', () => {
  const requiredOf = (one: Partial<PairModel>, more: Parameters<typeof system>[0] = {}) =>
    findings(lightSystem([pair('ink', 'ground', one)], more))[0]!.required
  expect(requiredOf({})).toBe(4.5)
  expect(requiredOf({ level: 'AAA' })).toBe(7)
  expect(requiredOf({}, { themes: [theme('light', { level: 'AAA' })] })).toBe(7)
  expect(requiredOf({}, { settings: { level: 'AAA' } })).toBe(7)
  expect(requiredOf({ minimum: 5.5 })).toBe(5.5)
  expect(requiredOf({ minimum: 5.5 }, { themes: [theme('light', { level: 'AAA' })] })).toBe(7)
})

it('answers a ratio just under its requirement as a breach, never rounded into a pass', () => {
  // #777 on white is 4.478…, #767676 is 4.542… (common practice, no source).
  const model = lightSystem([pair('near', 'white')], {
    tokens: [token('near', '#777'), token('white', '#fff')],
  })
  const [finding] = findings(model)
  expect(finding!.outcome).toBe('breach')
  expect(finding!.ratio).toBeCloseTo(4.478, 3)
})

it('answers pass at exactly the required ratio, and breach at the least above it', () => {
  const at = (minimum?: number) =>
    findings(lightSystem([pair('ink', 'ground', minimum === undefined ? {} : { minimum })]))[0]!
  const { ratio } = at()
  expect(at(ratio).outcome).toBe('pass')
  expect(at(ratio + 1e-12).outcome).toBe('breach')
})

it('answers focus-change at AA as measured with nothing required', () => {
  const [finding] = findings(lightSystem([pair('ground', 'ground', { use: 'focus-change' })]))
  expect(finding).toMatchObject({ ratio: 1, required: 0, outcome: 'pass' })
})

describe('verdict', () => {
  it('answers fail on a gating breach, and pass where the theme only reports', () => {
    const model = lightSystem([pair('grey', 'ground')])
    expect(verdictOf(evaluate(model)).verdict).toBe('fail')
    const reporting = lightSystem([pair('grey', 'ground')], {
      themes: [theme('light', { gating: false })],
    })
    const verdict = verdictOf(evaluate(reporting))
    expect(verdict.verdict).toBe('pass')
    expect(verdict.counts.breach).toBe(1)
    expect(verdict.findings[0]!.gating).toBe(false)
  })

  it('answers with the engine version, the gamut algorithm and the rule set', () => {
    const { engine } = verdictOf(evaluate(lightSystem([])))
    expect(engine).toEqual({ version: ENGINE_VERSION, gamutMap: GAMUT_MAP, ruleSet: RULE_SET })
    expect(GAMUT_MAP).toBe('css-color-4-binary-search-local-minde')
  })

  it('answers all findings, those that do not pass, or none, with the same counts', () => {
    const evaluation = evaluate(lightSystem([pair('grey', 'ground'), pair('ink', 'ground')]))
    const written = (['all', 'not-pass', 'none'] as const).map((include) => {
      const verdict = verdictOf(evaluation, { include })
      expect(verdict.counts).toMatchObject({ breach: 1, pass: 1 })
      return verdict.findings.map(({ outcome }) => outcome)
    })
    expect(written).toEqual([['breach', 'pass'], ['breach'], []])
  })
})

describe('exemptions', () => {
  const button = [
    token('label', '#8a8a8a', { states: ['hover', 'disabled'] }),
    token('fill', '#ffffff', { states: ['disabled'] }),
  ]
  const judged = (one: Partial<PairModel>, disabledFloor?: number) => {
    const settings = disabledFloor === undefined ? {} : { disabledFloor }
    const model = lightSystem([pair('label', 'fill', one)], { tokens: button, settings })
    return Object.fromEntries(
      findings(model).map((f) => [
        `${f.foregroundState}/${f.backgroundState}`,
        [f.outcome, f.reason],
      ]),
    )
  }

  it('answers together in disabled and a disabled foreground as exempt', () => {
    expect(judged({ relation: 'together' })['disabled/disabled']).toEqual(['exempt', 'disabled'])
    expect(judged({ relation: 'inside' })['disabled/rest']).toEqual(['exempt', 'disabled'])
  })

  it('leaves a resting label on a disabled button to its requirement unless declared inactive', () => {
    const tokens = [GREY, token('fill', '#fff', { states: ['disabled'] })]
    const on = (more: Partial<PairModel>) =>
      findings(lightSystem([pair('grey', 'fill', more)], { tokens })).find(
        (one) => one.backgroundState === 'disabled',
      )!
    expect(on({ relation: 'inside' }).outcome).toBe('breach')
    expect(on({ exempt: { kind: 'inactive', reason: 'greyed' } })).toMatchObject({
      outcome: 'exempt',
      reason: 'inactive',
    })
    // Together it is one component, disabled as a whole.
    expect(on({ relation: 'together' }).outcome).toBe('exempt')
  })

  it('leaves a resting link in a disabled background to its requirement, one component or not', () => {
    const tokens = [GREY, token('row', '#ffffff', { states: ['disabled'] })]
    for (const relation of ['together', 'inside'] as const) {
      const link = pair('grey', 'row', { use: 'link-in-text', relation, minimum: 9 })
      const all = findings(lightSystem([link], { tokens }))
      expect(all.map(({ backgroundState, outcome }) => [backgroundState, outcome])).toEqual([
        ['rest', 'breach'],
        ['disabled', 'breach'],
      ])
    }
  })

  it('answers a declared exemption with its kind, measured all the same', () => {
    for (const kind of ['logotype', 'decorative', 'inactive'] as const) {
      const exempt = { kind, reason: 'mark' }
      const [finding] = findings(lightSystem([pair('grey', 'ground', { exempt })]))
      expect(finding).toMatchObject({ outcome: 'exempt', reason: kind, required: 4.5 })
      expect(finding!.ratio).toBeLessThan(4.5)
    }
  })

  it('answers a breach under the system’s floor for disabled, and exempt from it up', () => {
    const under = judged({ relation: 'together' }, 2.5)['disabled/disabled']
    expect(under).toEqual(['breach', 'disabled-floor'])
    const settings = { disabledFloor: 2.5 }
    const floored = findings(lightSystem([pair('label', 'fill')], { tokens: button, settings }))
    expect(floored.map(({ required, reason }) => [required, reason])).toContainEqual([
      2.5,
      'disabled-floor',
    ])
    expect(judged({ relation: 'together' }, 1.05)['disabled/disabled']).toEqual([
      'exempt',
      'disabled',
    ])
    const logotype = { exempt: { kind: 'logotype' as const, reason: 'mark' } }
    expect(judged(logotype, 20)['rest/rest']).toEqual(['exempt', 'logotype'])
  })
})

describe('anyOf', () => {
  const band = (id: string, more: Partial<PairModel> = {}) =>
    pair(id, 'ground', { use: 'focus-adjacent', anyOf: 'ring', ...more })
  const tokens = [token('pale', '#e0e0e0'), token('deep', '#102040')]
  const ring = (one: Partial<PairModel>, other: Partial<PairModel> = {}) =>
    outcomes(findings(lightSystem([band('pale', one), band('deep', other)], { tokens })))

  it('answers pass for the others where one member meets its own requirement', () => {
    expect(ring({})).toEqual([
      ['pass', 'any-of'],
      ['pass', undefined],
    ])
  })

  it('leaves a member of another group, and one whose group meets nothing, in breach', () => {
    expect(ring({ anyOf: 'other' })[0]).toEqual(['breach', undefined])
    expect(ring({}, { minimum: 20 }).map(([outcome]) => outcome)).toEqual(['breach', 'breach'])
  })

  it('leaves a member that is only exempt, or that requires nothing, from carrying the others', () => {
    const exempt = { kind: 'decorative' as const, reason: 'drawn' }
    expect(ring({}, { exempt, minimum: 20 })[0]).toEqual(['breach', undefined])
    expect(ring({}, { use: 'focus-change' })[0]).toEqual(['breach', undefined])
  })

  it('answers by theme and state: a member met in one does not carry another', () => {
    const flip = token('flip', '#102040', {
      values: { dark: { rest: token('x', '#22272e').value } },
    })
    const model = system({
      tokens: [
        token('pale', '#e0e0e0', { values: { dark: { rest: token('x', '#2a2f38').value } } }),
        flip,
      ],
      pairs: [band('pale'), band('flip')],
    })
    const light = findings(model).filter((one) => one.theme === 'light')
    const dark = findings(model).filter((one) => one.theme === 'dark')
    expect(light.map(({ outcome }) => outcome)).toEqual(['pass', 'pass'])
    expect(dark.map(({ outcome }) => outcome)).toEqual(['breach', 'breach'])
  })
})
