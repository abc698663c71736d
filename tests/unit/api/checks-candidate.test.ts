import { describe, expect, it } from 'vitest'
import {
  type Compared,
  judgingOf,
  measureCandidate,
} from '#api/features/checks/measure-candidate.rules.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'
import type { SourceValue } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { createCheckBody } from '#shared/contracts/checks.contract.ts'
import { indexSystem } from '#shared/contracts/governed-system.ts'

const color = (text: string): SourceValue => {
  const parsed = parseColor(text)
  if (!parsed.ok) throw new TypeError(parsed.reason)
  return { kind: 'color', color: parsed.color }
}
const token = (id: string, name: string, value: SourceValue): GovernedToken => ({
  id,
  name,
  value,
  states: [],
  values: {},
  locked: false,
})

const MODEL: GovernedSystem = {
  settings: { level: 'AA', p3: false, p3Gates: false },
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
  tokens: [
    token('tok_paper', 'paper', color('#ffffff')),
    token('tok_ink', 'ink', color('#000000')),
    { ...token('tok_link', 'link', color('#0000ee')), states: ['hover'] },
    token('tok_soft', 'soft', color('#aaaaaa')),
  ],
  pairs: [
    {
      id: 'pair_link',
      foreground: 'tok_link',
      background: 'tok_paper',
      use: 'text',
      relation: 'inside',
      backdrop: [],
    },
    {
      id: 'pair_soft',
      foreground: 'tok_soft',
      background: 'tok_paper',
      use: 'text',
      relation: 'inside',
      backdrop: [],
    },
  ],
}

function headOf(model: GovernedSystem): Compared {
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError(JSON.stringify(checked.faults))
  return { index: indexSystem(model), evaluation: checked.evaluation }
}
const head = headOf(MODEL)

const hex = (digits: string) => ({
  $type: 'color',
  $value: {
    colorSpace: 'srgb',
    components: [0, 2, 4].map((at) => Number.parseInt(digits.slice(at, at + 2), 16) / 255),
  },
})
const alias = (name: string) => ({ $type: 'color', $value: `{${name}}` })

function measure(body: unknown, on: Compared = head) {
  const measured = measureCandidate(on, createCheckBody.parse(body), { exempts: true })
  if (!measured.ok) throw new TypeError(JSON.stringify(measured.refusal))
  return measured.evaluation
}
function refusalOf(body: unknown, on: Compared = head) {
  const measured = measureCandidate(on, createCheckBody.parse(body), { exempts: true })
  if (measured.ok) throw new TypeError('It was not refused')
  return measured.refusal
}
const findingsOf = (body: unknown, on: Compared = head) =>
  verdictOf(measure(body, on)).findings.map(({ foreground, foregroundState, outcome, ratio }) => ({
    foreground,
    state: foregroundState,
    outcome,
    ratio: Math.floor(ratio * 100) / 100,
  }))

describe('measureCandidate', () => {
  it('answers the head itself where nothing is sent', () => {
    expect(measure({})).toBe(head.evaluation)
    expect(measure({ tokens: {}, pairs: [] })).toBe(head.evaluation)
  })

  it('merges a document over the head and keeps the states of a token that stands', () => {
    const findings = findingsOf({ tokens: { link: hex('aaaaaa') } })
    expect(findings.map(({ foreground, state }) => [foreground, state])).toEqual([
      ['tok_link', 'rest'],
      ['tok_link', 'hover'],
      ['tok_soft', 'rest'],
    ])
    // 2.32: ACT rule afw4f7, failed example 1 (#aaa on #fff), printed as 2.3.
    expect(findings[0]).toMatchObject({ outcome: 'breach', ratio: 2.32 })
  })

  it('equals a full check of the same system', () => {
    const value = color('#767676')
    const tokens = MODEL.tokens.map((each) => (each.name === 'soft' ? { ...each, value } : each))
    const whole = headOf({ ...MODEL, tokens })
    const { findings } = verdictOf(measure({ tokens: { soft: hex('767676') } }))
    expect(findings).toEqual(verdictOf(whole.evaluation).findings)
  })

  it('follows references to tokens that only the head has', () => {
    const tokens = { brand: { link: alias('ink') } }
    const pairs = [{ foreground: 'brand.link', background: 'paper', use: 'text' }]
    const findings = findingsOf({ tokens, pairs })
    expect(findings.at(-1)).toEqual({
      foreground: 'new:brand.link',
      state: 'rest',
      outcome: 'pass',
      ratio: 21,
    })
  })

  it('takes states, overrides and rules from our own extension', () => {
    const own = { states: ['hover'], values: { light: { hover: '#ffffff' } } }
    const tokens = { soft: { ...hex('000000'), $extensions: { 'dev.dyewright': own } } }
    expect(findingsOf({ tokens }).slice(-2)).toEqual([
      { foreground: 'tok_soft', state: 'rest', outcome: 'pass', ratio: 21 },
      { foreground: 'tok_soft', state: 'hover', outcome: 'breach', ratio: 1 },
    ])
  })

  it('puts a document in the place of all tokens with mode replace', () => {
    const tokens = {
      paper: hex('ffffff'),
      ink: hex('000000'),
      link: hex('000000'),
      soft: hex('666666'),
    }
    const { resolved } = measure({ tokens, mode: 'replace' })
    expect([...resolved.tokens.keys()]).toEqual(['tok_paper', 'tok_ink', 'tok_link', 'tok_soft'])
    expect(findingsOf({ tokens, mode: 'replace' }).map(({ ratio }) => ratio)).toContain(5.74)
  })

  it('refuses a replacement without the tokens of declared pairs, naming each', () => {
    const tokens = { paper: hex('ffffff'), ink: hex('000000') }
    const refusal = refusalOf({ tokens, mode: 'replace' })
    expect(refusal.code).toBe('request-invalid')
    expect(refusal.faults).toEqual([
      {
        pointer: '/tokens',
        detail: 'link is missing, which the declared pair link on paper needs',
      },
      {
        pointer: '/tokens',
        detail: 'soft is missing, which the declared pair soft on paper needs',
      },
    ])
  })

  it('refuses references of a replacement to tokens that only the head has', () => {
    const tokens = { paper: hex('ffffff'), ink: hex('000000'), link: alias('soft') }
    const { faults } = refusalOf({ tokens, mode: 'replace' })
    expect(faults).toContainEqual(
      expect.objectContaining({ pointer: '/tokens/link/$value', code: 'alias-unresolved' }),
    )
  })

  it('refuses unknown names in pairs with a pointer for each', () => {
    const pairs = [
      { foreground: 'link', background: 'paper', use: 'text' },
      {
        foreground: 'lnk',
        background: 'papr',
        use: 'text',
        backdrop: ['ink', 'nk'],
        themes: ['dusk'],
      },
    ]
    expect(refusalOf({ pairs }).faults?.map(({ pointer }) => pointer)).toEqual([
      '/pairs/1/foreground',
      '/pairs/1/background',
      '/pairs/1/backdrop/1',
      '/pairs/1/themes/0',
    ])
  })

  it('tells the faults of a document and of the pairs beside it at once', () => {
    const tokens = { a: { $type: 'color', $value: 'red' }, b: alias('nowhere') }
    const pairs = [{ foreground: 'a', background: 'missing', use: 'text' }]
    const { faults } = refusalOf({ tokens, pairs })
    expect(faults?.map(({ pointer }) => pointer)).toEqual([
      '/tokens/b/$value',
      '/tokens/a/$value',
      '/pairs/0/background',
    ])
  })

  it('refuses a name that differs from another in its composition alone', () => {
    const [composed, parted] = ['caf\u00e9', 'cafe\u0301'] as const
    const twice = refusalOf({ tokens: { [composed]: hex('000000'), [parted]: hex('000000') } })
    expect(twice.faults?.map(({ pointer }) => pointer)).toEqual([`/tokens/${parted}`])
    const model = { ...MODEL, tokens: [...MODEL.tokens, token('tok_c', composed, color('#000'))] }
    const clash = refusalOf({ tokens: { [parted]: hex('000000') } }, headOf(model))
    expect(clash.faults?.map(({ pointer }) => pointer)).toEqual([`/tokens/${parted}`])
  })

  it('refuses what would make a name a group and a token at once', () => {
    const deck = token('tok_deck', 'surface.deck', color('#ffffff'))
    const on = headOf({ ...MODEL, tokens: [...MODEL.tokens, deck] })
    const tokens = { paper: { note: hex('000000') }, surface: hex('000000') }
    expect(refusalOf({ tokens }, on).faults).toEqual([
      { pointer: '/tokens/paper/note', detail: 'paper is a token, so it holds none' },
      { pointer: '/tokens/surface', detail: 'surface is a group: surface.deck is in it' },
    ])
  })

  it('refuses what the engine cannot resolve, pointing at the token or pair that does it', () => {
    const circle = refusalOf({ tokens: { soft: alias('link'), link: alias('soft') } })
    expect(circle.faults?.[0]?.pointer).toMatch(/^\/tokens\/(soft|link)/)
    const span = refusalOf({ tokens: { paper: hex('111111') } })
    expect(span).toMatchObject({
      code: 'system-unresolvable',
      faults: [{ pointer: '/tokens', code: 'theme-span' }],
    })
    const pairs = [{ foreground: 'ink', background: 'paper', use: 'text', minimum: 3 }]
    expect(refusalOf({ pairs })).toMatchObject({
      code: 'system-unresolvable',
      faults: [{ pointer: '/pairs/0/minimum', code: 'minimum-lower' }],
    })
  })

  it('leaves a declared breach a breach whatever group a sent pair joins', () => {
    const grouped = { ...MODEL, pairs: MODEL.pairs.map((pair) => ({ ...pair, anyOf: 'ring' })) }
    const on = headOf({ ...grouped, pairs: grouped.pairs.filter(({ id }) => id === 'pair_soft') })
    const pairs = [{ foreground: 'ink', background: 'paper', use: 'text', anyOf: 'ring' }]
    expect(findingsOf({ pairs }, on)).toMatchObject([
      { foreground: 'tok_soft', outcome: 'breach' },
      { foreground: 'tok_ink', outcome: 'pass' },
    ])
  })

  it('leaves a declared breach a breach though a sent copy of the pair is exempt', () => {
    const exempt = { kind: 'decorative', reason: 'said so' }
    const pairs = [{ foreground: 'soft', background: 'paper', use: 'text', exempt }]
    expect(
      findingsOf({ pairs }).filter(({ foreground }) => foreground === 'tok_soft'),
    ).toMatchObject([{ outcome: 'breach' }])
  })

  it('leaves names apart that signs of an identity could run together', () => {
    const tokens = { 'a/b': hex('aaaaaa'), a: hex('bbbbbb'), 'b+%2F': hex('cccccc') }
    const pairs = ['a/b', 'a', 'b+%2F'].map((foreground) => ({
      foreground,
      background: 'paper',
      use: 'text',
    }))
    const { findings } = verdictOf(measure({ tokens, pairs }))
    expect(new Set(findings.map(({ identity }) => identity)).size).toBe(findings.length)
  })
})

describe('judgingOf', () => {
  const judge = (body: unknown, newOnly: boolean) =>
    verdictOf(measure(body), { ...judgingOf(head, { newOnly, waivers: [] }), include: 'not-pass' })

  it('answers a breach that the head has, and is no lower now, as known with newOnly', () => {
    expect(judge({}, false)).toMatchObject({ verdict: 'fail', counts: { breach: 1, known: 0 } })
    expect(judge({}, true)).toMatchObject({ verdict: 'pass', counts: { breach: 0, known: 1 } })
    expect(judge({ tokens: { soft: hex('a8a8a8') } }, true).counts.known).toBe(1)
  })

  it('answers fail where a known breach got lower or another one came', () => {
    expect(judge({ tokens: { soft: hex('bbbbbb') } }, true)).toMatchObject({
      verdict: 'fail',
      counts: { breach: 1, known: 0 },
    })
    expect(judge({ tokens: { link: hex('aaaaaa') } }, true)).toMatchObject({
      verdict: 'fail',
      counts: { known: 1 },
    })
  })
})
