import { describe, expect, it } from 'vitest'
import { ruleEdits, widerStateRule } from '#console/features/rules/rule-edits.ts'
import {
  isNarrower,
  readScope,
  scopedRules,
  scopeText,
} from '#console/features/rules/rule-scopes.ts'
import { stateRuleInWords, themeRuleInWords } from '#console/features/rules/rule-words.ts'
import { isSameRules, readScopeFields, scopeFields } from '#console/features/rules/scope-text.ts'
import { readThemeRuleText, themeRuleText } from '#console/features/rules/theme-rule-text.ts'
import type { SystemModel, TokenModel } from '#shared/checks/model.ts'

const token = (name: string): TokenModel => ({
  id: `tok_${name}`,
  name,
  value: { kind: 'color', color: { l: 0.5, c: 0, h: null, alpha: 1 } },
  states: ['hover'],
  values: {},
})
const model: SystemModel = {
  settings: { level: 'AA', p3: false, p3Gates: false },
  states: { hover: { lightness: 0.06 } },
  prefixes: [{ prefix: 'action', states: { hover: { chroma: 0.9 } } }],
  themes: [{ id: 'thm_1', key: 'light', ground: 'tok_deck', ink: 'tok_ink', gating: true }],
  tokens: [token('deck'), token('ink'), token('action.fill')],
  pairs: [],
}

describe('the scopes of rules', () => {
  const rules = {
    states: {},
    prefixes: [{ prefix: 'action', states: { hover: { lightness: 0.1 } } }],
    etag: '"1"',
  }

  it('answers from wide to narrow with the tokens that each governs, by whole segments', () => {
    const tokens = [
      { name: 'action.fill' },
      { name: 'actions', rules: { states: { hover: { alpha: 0.5 } } } },
      { name: 'deck', rules: {} },
    ]
    const scopes = scopedRules(rules, tokens)
    expect(scopes.map(({ scope, governs }) => [scopeText(scope), governs])).toEqual([
      ['system', ['action.fill', 'actions', 'deck']],
      ['prefix:action', ['action.fill']],
      ['token:actions', ['actions']],
    ])
  })

  it('answers each address with the scope that wrote it, and any other with none', () => {
    for (const scope of [
      { kind: 'system' },
      { kind: 'prefix', prefix: 'a b' },
      { kind: 'token', name: 'x:y.z' },
    ] as const) {
      expect(readScope(scopeText(scope))).toEqual(scope)
    }
    expect([readScope(null), readScope('prefix:'), readScope('else:x')]).toEqual([
      undefined,
      undefined,
      undefined,
    ])
  })

  it('answers that a longer prefix and a token are narrower, never a scope than itself', () => {
    const [wide, narrow] = [
      { kind: 'prefix', prefix: 'action' },
      { kind: 'prefix', prefix: 'action.board' },
    ] as const
    expect([isNarrower(narrow, wide), isNarrower(wide, narrow), isNarrower(wide, wide)]).toEqual([
      true,
      false,
      false,
    ])
    expect(isNarrower({ kind: 'token', name: 'action' }, wide)).toBe(true)
  })
})

describe('rules in fields', () => {
  const scope = {
    states: { hover: { lightness: 0.05, towards: '{ink}' } },
    themes: { dark: { kind: 'match-contrast', against: 'ink', chroma: 0.9 } },
  } as const

  it('answers what was filled in, read back, as the same rules', () => {
    const text = scopeFields(scope, ['dark', 'kiosk'])
    const read = readScopeFields(text)
    expect(read).toEqual(scope)
    expect(isSameRules(read ?? {}, scope)).toBe(true)
  })

  it('leaves out what the kind does not read', () => {
    const text = themeRuleText({ kind: 'relative', k: 2, chroma: 0.5 })
    expect(readThemeRuleText({ ...text, kind: 'keep' })).toEqual({
      ok: true,
      rule: { kind: 'keep' },
    })
  })

  it('refuses a factor out of its range, at its field', () => {
    const text = { ...themeRuleText({ kind: 'mirror' }), chroma: '11' }
    expect(readThemeRuleText(text)).toEqual({
      ok: false,
      faults: { chroma: 'Write a number from 0 to 10.' },
    })
  })
})

describe('rules for the engine', () => {
  it('answers what would hold if the scope said nothing, from the wider rules', () => {
    const prefix = { kind: 'prefix', prefix: 'action' } as const
    expect(widerStateRule(model, prefix, 'hover')).toMatchObject({
      lightness: 0.06,
      chroma: 1,
      away: 'ground',
    })
    const name = { kind: 'token', name: 'action.fill' } as const
    expect(widerStateRule(model, name, 'hover')).toMatchObject({ lightness: 0.06, chroma: 0.9 })
    expect(widerStateRule(model, { kind: 'system' }, 'hover')).toMatchObject({ lightness: 0.05 })
  })

  it('answers a prefix that says nothing any more as one that is gone', () => {
    const read = ruleEdits(model, { kind: 'prefix', prefix: 'action' }, {})
    expect(read).toEqual({ ok: true, edits: { prefixes: [] } })
  })

  it('refuses a reference to a token that is not there, with where it stands', () => {
    const rules = { states: { hover: { away: '{sky}' } } }
    expect(ruleEdits(model, { kind: 'system' }, rules)).toEqual({
      ok: false,
      faults: [{ pointer: '/states/hover/away', detail: 'There is no token named sky' }],
    })
  })
})

describe('rules in words', () => {
  it('answers each field that is said, and nothing for those that are not', () => {
    expect(stateRuleInWords({ lightness: 0.05, away: '{deck}', hue: -3 })).toBe(
      '0.05 away from deck, hue − 3°',
    )
    expect(stateRuleInWords({})).toBe('')
    expect(themeRuleInWords({ kind: 'shift', lightness: -0.09, chroma: 1.05 })).toBe(
      'shift from the parent’s, lightness − 0.09, chroma × 1.05',
    )
  })
})
