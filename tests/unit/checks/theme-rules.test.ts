import { describe, expect, it } from 'vitest'
import {
  THEME_RULE_KINDS,
  type ThemeModel,
  type ThemeRule,
  type TokenModel,
} from '#shared/checks/model.ts'
import { type RenderedColor, renderColor } from '#shared/color/render.ts'
import { naiveRatio, paintAll } from './naive-contrast.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { findings, hexAt, lightnessAt, read } from './reading.ts'

const [G, I, G2, I2] = [0.97, 0.25, 0.22, 0.94]

function ruled(text: string, rule: ThemeRule, more: Partial<TokenModel> = {}) {
  return system({ tokens: [token('t', text, more)], dark: { rule } })
}

function ratioOf(color: RenderedColor, ground: RenderedColor): number {
  return naiveRatio(paintAll([ground, color], 'srgb'), paintAll([ground], 'srgb'), 'srgb')
}

describe('mirror', () => {
  it('answers g′ + (l − g)(i′ − g′)/(i − g)', () => {
    const wanted = G2 + ((0.6 - G) * (I2 - G2)) / (I - G)
    expect(lightnessAt(ruled('oklch(0.6 0.1 258)', { kind: 'mirror' }), 't dark')).toBeCloseTo(
      wanted,
      12,
    )
  })

  it('answers chroma × its factor, hue and alpha kept', () => {
    const model = ruled('oklch(0.6 0.1 258 / 0.4)', { kind: 'mirror', chroma: 0.92 })
    expect(read(model, 't dark').oklch).toMatchObject({ h: 258, alpha: 0.4 })
    expect(read(model, 't dark').oklch.c).toBeCloseTo(0.092, 12)
  })

  it('answers lightness stopped at 0 and 1', () => {
    expect(lightnessAt(ruled('oklch(1 0 0)', { kind: 'mirror' }), 't dark')).toBeCloseTo(0.19, 12)
    expect(lightnessAt(ruled('oklch(0 0 0)', { kind: 'mirror' }), 't dark')).toBe(1)
  })
})

describe('relative', () => {
  it('answers g′ + k(l − g), k 1 by default, clamped', () => {
    const raised = 'oklch(0.99 0 0)'
    expect(lightnessAt(ruled(raised, { kind: 'relative' }), 't dark')).toBeCloseTo(G2 + 0.02, 12)
    expect(lightnessAt(ruled(raised, { kind: 'relative', k: 3 }), 't dark')).toBeCloseTo(
      G2 + 0.06,
      12,
    )
    expect(lightnessAt(ruled('oklch(0.6 0 0)', { kind: 'relative' }), 't dark')).toBe(0)
  })

  it('leaves surfaces in the order of their lightness', () => {
    const tokens = [token('low', 'oklch(0.95 0 0)'), token('high', 'oklch(0.99 0 0)')]
    const model = system({ tokens, dark: { rule: { kind: 'relative' } } })
    expect(lightnessAt(model, 'low dark')).toBeLessThan(lightnessAt(model, 'high dark'))
  })
})

describe('keep and shift', () => {
  it('leaves a theme without a rule to keep its parent, chroma factor or not', () => {
    expect(hexAt(ruled('#336699', {}), 't dark')).toBe('#336699')
    const kept = ruled('#336699', { kind: 'keep', chroma: 0.2, lightness: 0.3 })
    expect(hexAt(kept, 't dark')).toBe('#336699')
    expect(read(kept, 't dark').provenance).toMatchObject({ from: 'theme-rule', theme: 'dark' })
  })

  it('answers lightness and hue added, chroma multiplied', () => {
    const rule: ThemeRule = { kind: 'shift', lightness: 0.1, hue: -300, chroma: 0.5 }
    const { oklch } = read(ruled('oklch(0.6 0.1 258)', rule), 't dark')
    expect([oklch.l, oklch.c, oklch.h]).toEqual([0.7, 0.05, 318])
    expect(lightnessAt(ruled('oklch(0.95 0.1 258)', rule), 't dark')).toBe(1)
  })

  it('leaves a missing hue missing', () => {
    const rule: ThemeRule = { kind: 'shift', hue: 40 }
    expect(read(ruled('oklch(0.6 0.1 none)', rule), 't dark').oklch.h).toBeNull()
  })
})

describe('match-contrast', () => {
  const rule: ThemeRule = { kind: 'match-contrast' }

  it('answers the parent’s ratio or the least above it that 14 halvings reach, never under it', () => {
    for (const text of ['oklch(0.5 0.15 258)', 'oklch(0.62 0.2 30)', 'oklch(0.8 0.1 140)']) {
      const model = ruled(text, rule)
      const wanted = ratioOf(read(model, 't').rendered, read(model, 'ground').rendered)
      const got = ratioOf(read(model, 't dark').rendered, read(model, 'ground dark').rendered)
      expect(got).toBeGreaterThanOrEqual(wanted)
      expect(got).toBeLessThan(wanted + 0.15)
      const step = (1 - G2) / 2 ** 14
      const below = { ...read(model, 't dark').oklch, l: lightnessAt(model, 't dark') - step }
      const under = system({
        tokens: [token('t', '#000', { value: { kind: 'color', color: below } })],
        light: { ground: 'ground', ink: 'ink' },
      })
      const ground = read(model, 'ground dark').rendered
      expect(ratioOf(read(under, 't').rendered, ground)).toBeLessThanOrEqual(got)
    }
  })

  it('answers the far end after 14 halvings between the reference and the extreme', () => {
    const model = ruled('oklch(0.5 0.15 258)', rule)
    const wanted = ratioOf(read(model, 't').rendered, read(model, 'ground').rendered)
    const ground = read(model, 'ground dark').rendered
    let [near, far] = [G2, 1]
    for (let halving = 0; halving < 14; halving++) {
      const l = (near + far) / 2
      if (ratioOf(renderColor({ l, c: 0.15, h: 258, alpha: 1 }), ground) >= wanted) far = l
      else near = l
    }
    expect(lightnessAt(model, 't dark')).toBe(far)
  })

  it('answers the very same colour where ground and reference are the same in both themes', () => {
    const tokens = ['ground', 'ink'].map((id, at) => {
      const text = at === 0 ? '#ffffff' : '#000000'
      return token(id, text, { values: { dark: { rest: value(text) } } })
    })
    const base = system({ tokens: [token('t', '#777777')], dark: { rule } })
    expect(hexAt({ ...base, tokens: [...tokens, ...base.tokens.slice(2)] }, 't dark')).toBe(
      '#777777',
    )
  })

  it('answers the extreme itself where only it has the parent’s ratio', () => {
    const base = system({ tokens: [token('t', '#000000')], dark: { rule } })
    const [ground, ink] = [
      token('ground', '#ffffff', { values: { dark: { rest: value('#000000') } } }),
      token('ink', '#000000', { values: { dark: { rest: value('#ffffff') } } }),
    ]
    const model = { ...base, tokens: [ground, ink, ...base.tokens.slice(2)] }
    const { provenance } = read(model, 't dark')
    expect(hexAt(model, 't dark')).toBe('#ffffff')
    expect(provenance).not.toHaveProperty('short')
  })

  it('answers against ink on the side away from ink’s own, as from ground to ink', () => {
    // In the parent the token is lighter than its ink, on the ground's side; in dark that is darker.
    const model = ruled('oklch(0.6 0 0)', { kind: 'match-contrast', against: 'ink' })
    expect(lightnessAt(model, 't dark')).toBeLessThan(I2)
    const beyond = ruled('oklch(0.2 0 0)', { kind: 'match-contrast', against: 'ink' })
    expect(lightnessAt(beyond, 't dark')).toBeGreaterThan(I2)
  })

  it('answers on ink’s side where the parent lies on ink’s side, and on the other otherwise', () => {
    expect(lightnessAt(ruled('oklch(0.9 0 0)', rule), 't dark')).toBeGreaterThan(G2)
    expect(lightnessAt(ruled('oklch(1 0 0)', rule), 't dark')).toBeLessThan(G2)
  })

  it('answers ink’s side for a token level with its reference', () => {
    const translucent = ruled('oklch(0.97 0.1 258)', rule)
    expect(lightnessAt(translucent, 't dark')).toBeGreaterThan(G2)
  })

  it('answers against another token in the same theme', () => {
    const board = token('board', '#123', { values: { dark: { rest: value('#9ab') } } })
    const against: ThemeRule = { kind: 'match-contrast', against: { token: 'board' } }
    const model = system({ tokens: [board, token('t', '#fff')], dark: { rule: against } })
    const wanted = ratioOf(read(model, 't').rendered, read(model, 'board').rendered)
    const got = ratioOf(read(model, 't dark').rendered, read(model, 'board dark').rendered)
    // #123 carries white at more than the ratio that black reaches on #9ab: the shortfall is told.
    expect(wanted).toBeGreaterThan(15)
    expect(hexAt(model, 't dark')).toBe('#000000')
    expect(read(model, 't dark').provenance).toMatchObject({ short: { wanted, got } })
  })

  it('answers on the other side where the extreme of its own side does not reach', () => {
    const mid = token('mid', '#000', { values: { dark: { rest: value('#aaa') } } })
    const against: ThemeRule = { kind: 'match-contrast', against: { token: 'mid' } }
    // White on black is 21; on #aaa neither reaches it. A grey of 5:1 on black must turn dark on #aaa.
    const model = system({ tokens: [mid, token('t', '#7b7b7b')], dark: { rule: against } })
    expect(lightnessAt(model, 't dark')).toBeLessThan(lightnessAt(model, 'mid dark'))
    const { provenance } = read(model, 't dark')
    expect(provenance.from === 'theme-rule' && provenance.short).toBeFalsy()
  })

  it('answers with translucent colours composited, alpha kept', () => {
    const model = ruled('oklch(0.3 0.05 258 / 0.6)', rule)
    expect(read(model, 't dark').oklch.alpha).toBe(0.6)
    const wanted = ratioOf(read(model, 't').rendered, read(model, 'ground').rendered)
    const got = ratioOf(read(model, 't dark').rendered, read(model, 'ground dark').rendered)
    expect(got).toBeGreaterThanOrEqual(wanted)
    expect(got).toBeLessThan(wanted + 0.3)
  })

  it('leaves a token that is matched against itself as it is', () => {
    const own: ThemeRule = { kind: 'match-contrast', against: { token: 't' } }
    expect(hexAt(ruled('#336699', own), 't dark')).toBe('#336699')
  })
})

describe('theme parents', () => {
  const themes: ThemeModel[] = [
    theme('light'),
    theme('dark', { rule: { kind: 'shift', lightness: -0.1 } }),
    theme('kiosk', { from: 'dark', rule: { kind: 'shift', lightness: -0.2 } }),
  ]

  it('answers a theme’s rule on its parent’s value, and does not inherit the parent’s rule', () => {
    const model = system({ themes, tokens: [token('t', 'oklch(0.9 0 0)')] })
    expect(lightnessAt(model, 't kiosk')).toBeCloseTo(0.6, 12)
    const without = [themes[0]!, themes[1]!, theme('kiosk', { from: 'dark' })]
    const still = system({ themes: without, tokens: [token('t', 'oklch(0.9 0 0)')] })
    expect(lightnessAt(still, 't kiosk')).toBeCloseTo(0.8, 12)
  })

  it('answers the base for a theme that names no parent', () => {
    const flat = [
      themes[0]!,
      themes[1]!,
      theme('kiosk', { rule: { kind: 'shift', lightness: -0.2 } }),
    ]
    const model = system({ themes: flat, tokens: [token('t', 'oklch(0.9 0 0)')] })
    expect(lightnessAt(model, 't kiosk')).toBeCloseTo(0.7, 12)
  })

  it('answers an override of the parent, ruled by the theme', () => {
    const tokens = [
      token('t', 'oklch(0.9 0 0)', { values: { dark: { rest: value('oklch(0.5 0 0)') } } }),
    ]
    expect(lightnessAt(system({ themes, tokens }), 't kiosk')).toBeCloseTo(0.3, 12)
  })

  it('answers mirror between the parent’s ground and ink and the theme’s own', () => {
    const chain = [
      themes[0]!,
      theme('dark'),
      theme('kiosk', { from: 'dark', rule: { kind: 'mirror' } }),
    ]
    const model = system({ themes: chain, tokens: [token('t', 'oklch(0.6 0 0)')] })
    expect(lightnessAt(model, 't kiosk')).toBeCloseTo(1 + ((0.6 - G2) * (0 - 1)) / (I2 - G2), 5)
  })
})

describe('rule scopes', () => {
  it('answers field by field: system, then prefixes from short to long by whole segments, then the token', () => {
    const tokens = ['action', 'action.fill', 'action.fill.deep', 'actions'].map((name) =>
      token(name, 'oklch(0.5 0.1 100)', {
        rules: name === 'action.fill.deep' ? { themes: { dark: { hue: 7 } } } : {},
      }),
    )
    const model = system({
      tokens,
      dark: { rule: { kind: 'shift', lightness: 0.1 } },
      prefixes: [
        { prefix: 'action.fill', themes: { dark: { lightness: 0.3 } } },
        { prefix: 'action', themes: { dark: { lightness: 0.2, chroma: 0.5 } } },
      ],
    })
    const dark = (name: string) => {
      const { l, c, h } = read(model, `${name} dark`).oklch
      return [l, c, h].map((part) => Math.round(part! * 1e6) / 1e6)
    }
    expect(dark('actions')).toEqual([0.6, 0.1, 100])
    expect(dark('action')).toEqual([0.7, 0.05, 100])
    expect(dark('action.fill')).toEqual([0.8, 0.05, 100])
    expect(dark('action.fill.deep')).toEqual([0.8, 0.05, 107])
  })

  it('decides a verdict: each theme rule gives another outcome to the same pair', () => {
    const outcomeOf = (rule: ThemeRule) => {
      const model = system({
        tokens: [token('label', 'oklch(0.45 0.1 258)')],
        pairs: [pair('label', 'ground')],
        dark: { rule },
      })
      return findings(model).map(({ outcome }) => outcome)
    }
    expect(outcomeOf({ kind: 'keep' })).toEqual(['pass', 'breach'])
    expect(outcomeOf({ kind: 'relative' })).toEqual(['pass', 'breach'])
    expect(outcomeOf({ kind: 'mirror' })).toEqual(['pass', 'pass'])
    expect(outcomeOf({ kind: 'match-contrast' })).toEqual(['pass', 'pass'])
    expect(outcomeOf({ kind: 'shift', lightness: 0.3 })).toEqual(['pass', 'pass'])
  })
})

it('answers alike wherever in the ledger ground and ink stand', () => {
  for (const kind of THEME_RULE_KINDS) {
    const model = ruled('oklch(0.99 0.01 80)', { kind })
    const [ground, ink, t] = model.tokens as [TokenModel, TokenModel, TokenModel]
    const first = read({ ...model, tokens: [t, ink, ground] }, 't dark')
    expect(first).toEqual(read(model, 't dark'))
    expect(read({ ...model, tokens: [ground, t, ink] }, 't dark')).toEqual(first)
  }
})

it('leaves ink free to alias a token that relative moves, since relative looks at the grounds alone', () => {
  const kiosk = theme('kiosk', { from: 'dark', rule: { kind: 'relative', k: 10 } })
  const deep = token('deep', '#777', { values: { dark: { rest: value('oklch(0.13 0 0)') } } })
  const base = system({ themes: [theme('light'), theme('dark'), kiosk], tokens: [deep] })
  const [ground, ink] = base.tokens as [TokenModel, TokenModel]
  const aliased = { ...ink, values: { ...ink.values, kiosk: { rest: value('{deep}') } } }
  const model = { ...base, tokens: [ground, aliased, deep] }
  expect(lightnessAt(model, 'ink kiosk')).toBeCloseTo(0.1, 6)
})
