import { describe, expect, it } from 'vitest'
import { history } from '#scripts/demo/larkhaven/history.ts'
import { larkhaven } from '#scripts/demo/larkhaven/larkhaven.ts'
import { opening } from '#scripts/demo/larkhaven/opening.ts'
import { wholeAfter } from '#scripts/demo/larkhaven/whole-system.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import {
  type Finding,
  RELATIONS,
  type RuleScope,
  type SystemModel,
  THEME_RULE_KINDS,
  USES,
} from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'

const verdict = (model: SystemModel) => {
  const checked = checkSystem(model)
  if (!checked.ok) throw new Error(JSON.stringify(checked.faults))
  return verdictOf(checked.evaluation)
}
const outcomes = (model: SystemModel) =>
  new Map(verdict(model).findings.map(({ identity, outcome }) => [identity, outcome]))
const breachesOf = (model: SystemModel): Finding[] =>
  verdict(model).findings.filter(({ outcome }) => outcome === 'breach')

const head = modelFromWire(wholeAfter(larkhaven))

const withoutRule = (scope: RuleScope, theme: string): RuleScope => {
  const { [theme]: _, ...themes } = scope.themes ?? {}
  return { ...scope, themes }
}

/** Each theme rule of the demo with the system that lacks it. */
const themeRules: readonly { name: string; kind: string | undefined; without: SystemModel }[] = [
  ...head.themes.flatMap((theme, at) => {
    const { rule, ...bare } = theme
    if (!rule || rule.kind === 'keep') return []
    return [
      {
        name: `${theme.key}: ${rule.kind}`,
        kind: rule.kind,
        without: { ...head, themes: head.themes.with(at, bare) },
      },
    ]
  }),
  ...head.prefixes.flatMap(({ prefix, ...scope }, at) =>
    Object.entries(scope.themes ?? {}).map(([theme, { kind }]) => ({
      name: `${theme}, ${prefix}: ${kind}`,
      kind,
      without: {
        ...head,
        prefixes: head.prefixes.with(at, { prefix, ...withoutRule(scope, theme) }),
      },
    })),
  ),
  ...head.tokens.flatMap((token, at) =>
    Object.entries(token.rules?.themes ?? {}).map(([theme, { kind }]) => ({
      name: `${theme}, ${token.name}: ${kind}`,
      kind,
      without: {
        ...head,
        tokens: head.tokens.with(at, { ...token, rules: withoutRule(token.rules ?? {}, theme) }),
      },
    })),
  ),
]

describe('theme rules of the demo', () => {
  it('answers every kind of rule', () => {
    expect(new Set(themeRules.map(({ kind }) => kind))).toEqual(new Set(THEME_RULE_KINDS))
  })

  const before = outcomes(head)
  it.each(themeRules)(
    'answers a breach where it passed, without the rule of $name',
    ({ without }) => {
      const after = outcomes(without)
      const broken = [...before].filter(
        ([identity, outcome]) => outcome === 'pass' && after.get(identity) === 'breach',
      )
      expect(broken.length).toBeGreaterThan(0)
    },
  )
})

describe('the demo at its head', () => {
  it('answers the size it is said to have', () => {
    expect(head.themes.map(({ key }) => key)).toEqual(['light', 'dark', 'kiosk'])
    expect(head.tokens.length).toBeGreaterThanOrEqual(115)
    expect(head.tokens.length).toBeLessThanOrEqual(130)
    expect(head.pairs.length).toBeGreaterThanOrEqual(150)
    expect(head.pairs.length).toBeLessThanOrEqual(170)
    expect(new Set(head.pairs.map(({ product }) => product))).toEqual(
      new Set(['timetable', 'quayside-kiosk', 'crew-tablet']),
    )
  })

  it('answers every use, both relations, backdrops known and unknown, groups and an exemption', () => {
    expect(new Set(head.pairs.map(({ use }) => use))).toEqual(new Set(USES))
    expect(new Set(head.pairs.map(({ relation }) => relation))).toEqual(new Set(RELATIONS))
    expect(head.pairs.some(({ backdrop }) => backdrop === 'unknown')).toBe(true)
    expect(head.pairs.some(({ backdrop }) => backdrop.length > 0 && backdrop !== 'unknown')).toBe(
      true,
    )
    expect(head.pairs.filter(({ exempt }) => exempt?.kind === 'logotype')).toHaveLength(2)
    const { findings } = verdict(head)
    expect(findings.some(({ reason }) => reason === 'any-of')).toBe(true)
    expect(
      findings.some(
        ({ outcome, backgroundState }) => outcome === 'exempt' && backgroundState === 'disabled',
      ),
    ).toBe(true)
  })

  it('answers every way to set a value', () => {
    const kinds = head.tokens.map(({ value }) => value.kind)
    expect(new Set(kinds)).toEqual(new Set(['color', 'alias', 'derived']))
    expect(head.tokens.some(({ values }) => Object.keys(values).length > 0)).toBe(true)
  })

  it('answers nine open breaches, those of the text below 4.5 among them', () => {
    const seen = breachesOf(head).map(
      ({ foreground, background, theme, foregroundState, backgroundState }) =>
        `${foreground} on ${background}, ${theme}, ${foregroundState}/${backgroundState}`,
    )
    expect(seen.sort()).toEqual([
      'action.board.text on action.board.fill, light, rest/focus',
      'action.board.text on action.board.fill, light, rest/rest',
      'chart.route.3 on chart.paper, dark, rest/rest',
      'chart.route.3 on chart.paper, light, rest/rest',
      'crew.beacon on crew.watch.fill, light, rest/rest',
      'status.delayed on status.wash.delayed, light, rest/rest',
      'status.delayed on surface.deck, light, rest/rest',
      'status.delayed on surface.hull, light, rest/rest',
      'text.muted on surface.cabin, light, rest/rest',
    ])
  })

  it('answers one pair that passes in sRGB and fails in Display P3', () => {
    const wide = breachesOf(head).filter(({ basis }) => basis === 'p3')
    expect(wide).toHaveLength(1)
    const srgbOnly = { ...head, settings: { ...head.settings, p3Gates: false } }
    const same = verdict(srgbOnly).findings.find(({ identity }) => identity === wide[0]?.identity)
    expect(same).toMatchObject({ outcome: 'pass', basis: 'srgb' })
  })
})

describe('the history of the demo', () => {
  it('answers at least twelve revisions since the opening, by four people', () => {
    expect(history.length).toBeGreaterThanOrEqual(12)
    expect(new Set(history.map(({ by }) => by))).toEqual(
      new Set(['a11y', 'maintainer', 'pelle', 'sanna']),
    )
  })

  it('answers a reason for every revision', () => {
    const messages = larkhaven.map((step) =>
      step.kind === 'put-theme' ? step.theme.message : step.body.message,
    )
    expect(messages.every(Boolean)).toBe(true)
  })

  it('answers breaches that closed again, by repair and by exemption', () => {
    const states = history.map((_, at) =>
      breachesOf(modelFromWire(wholeAfter(larkhaven.slice(0, opening.length + at)))),
    )
    const ever = new Set(states.flat().map(({ identity }) => identity))
    const open = new Set(breachesOf(head).map(({ identity }) => identity))
    const closed = [...ever].filter((identity) => !open.has(identity))
    expect(closed.length).toBeGreaterThanOrEqual(12)
    expect(closed.some((identity) => identity.startsWith('brand.logotype'))).toBe(true)
    expect(closed.some((identity) => identity.startsWith('action.cancel.text'))).toBe(true)
  })
})
