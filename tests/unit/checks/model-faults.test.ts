import { describe, expect, it } from 'vitest'
import type { SourceValue, SystemModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { resolveSystem } from '#shared/checks/resolve-system.ts'
import { pair, system, theme, token, value } from './model-builder.ts'
import { evaluate, faultsOf, hexAt } from './reading.ts'

const codes = (model: SystemModel) => faultsOf(model).map(({ code }) => code)

describe('faults', () => {
  it('refuses a theme whose parent is missing, and reads it from the base', () => {
    const dusk = theme('dusk', { from: 'gone' })
    const model = system({ themes: [theme('light'), dusk] })
    const set = model.tokens.map((own) => ({ ...own, values: { dusk: { rest: own.value } } }))
    expect(faultsOf({ ...model, tokens: set })).toEqual([
      {
        code: 'reference-missing',
        detail: 'Theme dusk derives from gone, which is missing',
        theme: 'dusk',
      },
    ])
  })

  it('leaves a state or a field of a rule that is there without a value', () => {
    const plain = token('a', '#777777', { states: ['hover'] })
    const holes = {
      ...plain,
      values: { dark: { rest: undefined, hover: undefined } },
      rules: { states: { hover: { lightness: undefined, chroma: 0.5 } } },
    } as unknown as typeof plain
    const given = { ...plain, rules: { states: { hover: { chroma: 0.5 } } } }
    const model = system({ tokens: [holes] })
    expect(codes(model)).toEqual([])
    const meant = system({ tokens: [given] })
    for (const place of ['a', 'a hover', 'a dark hover']) {
      expect(hexAt(model, place)).toBe(hexAt(meant, place))
    }
  })

  it('refuses a cycle, naming its path once', () => {
    const model = system({ tokens: [token('a', '{b}'), token('b', '{c}'), token('c', '{a}')] })
    const faults = faultsOf(model)
    expect(faults).toHaveLength(1)
    expect(faults[0]).toMatchObject({ code: 'reference-cycle', token: 'a' })
    expect(faults[0]!.detail).toContain('a → b → c → a')
  })

  it('refuses an edit that closes a cycle, with the fault of a full pass', () => {
    const model = system({ tokens: [token('a', '{b}'), token('b', '#777777')] })
    const edited = recheck(evaluate(model), { tokens: { put: [token('b', '{a}')] } })
    const whole = system({ tokens: [token('a', '{b}'), token('b', '{a}')] })
    expect(edited).toEqual({ ok: false, faults: faultsOf(whole) })
    expect(codes(whole)).toEqual(['reference-cycle'])
  })

  it('refuses a cycle that closes in one theme only, naming the theme', () => {
    const b = token('b', '#777', { values: { dark: { rest: value('{a}') } } })
    const faults = faultsOf(system({ tokens: [token('a', '{b}'), b] }))
    expect(faults.map(({ code, theme: at }) => [code, at])).toEqual([['reference-cycle', 'dark']])
  })

  it.each(['mirror', 'relative', 'match-contrast'] as const)(
    'refuses a theme that leaves ground and ink to its %s rule, without calling that a cycle',
    (kind) => {
      const dusk = { ...theme('dusk'), rule: { kind } }
      const model = system({ tokens: [token('a', '#777')], themes: [theme('light'), dusk] })
      expect(faultsOf(model).map(({ code, token: at }) => [code, at])).toEqual([
        ['theme-unset', 'ground'],
        ['theme-unset', 'ink'],
      ])
    },
  )

  it('refuses a cycle beside a theme that leaves its ground unset', () => {
    const dusk = { ...theme('dusk'), rule: { kind: 'mirror' as const } }
    const tokens = [token('a', '{b}'), token('b', '{a}')]
    const model = system({ tokens, themes: [theme('light'), dusk] })
    expect(codes(model)).toEqual(['theme-unset', 'theme-unset', 'reference-cycle'])
  })

  it('refuses a cycle through match-contrast', () => {
    const against = (id: string) => ({
      rules: { themes: { dark: { kind: 'match-contrast' as const, against: { token: id } } } },
    })
    const model = system({
      tokens: [token('a', '#777', against('b')), token('b', '#555', against('a'))],
    })
    expect(codes(model)).toEqual(['reference-cycle'])
  })

  it('leaves a token aliasing another’s state-changed sibling without a false cycle', () => {
    // b's hover follows a's rest, a's hover follows b's rest: nodes, not tokens, make a cycle.
    const hover = (id: string) => ({
      states: ['hover' as const],
      values: { light: { hover: value(`{${id}}`) } },
    })
    const model = system({
      tokens: [token('a', '#777777', hover('b')), token('b', '#555555', hover('a'))],
    })
    expect(hexAt(model, 'a hover')).toBe('#555555')
  })

  it('refuses more than 32 aliases one after another, and takes 32', () => {
    const chain = (links: number) => {
      const tokens = Array.from({ length: links }, (_, at) => token(`t${at}`, `{t${at + 1}}`))
      return system({ tokens: [...tokens, token(`t${links}`, '#777')] })
    }
    expect(codes(chain(32))).toEqual([])
    expect(faultsOf(chain(33)).map(({ code, token: id }) => [code, id])).toEqual([
      ['alias-depth', 't0'],
    ])
  })

  it('answers a chain of 5,000 without overflowing: a fault for aliases, values for derivations', () => {
    const make = (link: (id: string) => SourceValue) => {
      const tokens = Array.from({ length: 5000 }, (_, at) => ({
        ...token(`t${at}`, '#777'),
        value: link(`t${at + 1}`),
      }))
      return system({ tokens: [...tokens, token('t5000', '#777777')] })
    }
    const aliases = make((id) => ({ kind: 'alias', token: id }))
    expect(codes(aliases).filter((code) => code === 'alias-depth')).toHaveLength(4968)
    const resolution = resolveSystem(make((id) => ({ kind: 'derived', token: id })))
    expect(resolution.ok).toBe(true)
  })

  it('refuses ground and ink nearer than 4.5, translucent, or not set in the theme itself', () => {
    const near = system({ dark: { ink: 'ground' } })
    expect(codes(near)).toEqual(['theme-span'])
    const base = system()
    const glass = {
      ...base,
      tokens: [token('ground', '#ffffff80', base.tokens[0]), base.tokens[1]!].map((one, at) =>
        at === 0 ? { ...one, value: value('#ffffff80') } : one,
      ),
    }
    expect(codes(glass)).toEqual(['theme-span'])
    const unset = system({ themes: [theme('light'), theme('sepia')] })
    expect(faultsOf(unset).map(({ code, token: id }) => [code, id])).toEqual([
      ['theme-unset', 'ground'],
      ['theme-unset', 'ink'],
    ])
  })

  it('refuses ink at 4.478 on its ground and takes it at 4.542', () => {
    // #777777 and #767676 on white (common practice, no source).
    const on = (ink: string) => {
      const base = system({ themes: [theme('light')] })
      return { ...base, tokens: [token('ground', '#ffffff'), token('ink', ink)] }
    }
    expect(faultsOf(on('#777777')).map(({ code, detail }) => [code, detail])).toEqual([
      ['theme-span', 'Ink on the ground of theme light is 4.47:1, less than 4.5:1'],
    ])
    expect(codes(on('#767676'))).toEqual([])
  })

  it('refuses theme parents that lead back, and a base with a parent', () => {
    const themes = [
      theme('light'),
      theme('dark', { from: 'kiosk' }),
      theme('kiosk', { from: 'dark' }),
    ]
    expect(codes(system({ themes }))).toEqual(['theme-cycle'])
    expect(codes(system({ light: { from: 'dark' } }))).toEqual(['theme-cycle'])
  })

  it('refuses a level or a minimum below what the system holds', () => {
    const pairs = [
      pair('ink', 'ground', { level: 'AA' }),
      pair('ink', 'ground', { use: 'non-text', minimum: 2.9 }),
    ]
    const model = system({ pairs, settings: { level: 'AAA' }, dark: { level: 'AA' } })
    expect(codes(model)).toEqual(['level-lower', 'level-lower', 'minimum-lower'])
  })

  it('refuses a minimum below the level that the pair itself asks for', () => {
    const asking = (minimum: number) =>
      codes(system({ pairs: [pair('ink', 'ground', { level: 'AAA', minimum })] }))
    expect(asking(6.9)).toEqual(['minimum-lower'])
    expect(asking(7)).toEqual([])
  })

  it('refuses every missing reference and lightness out of range at once', () => {
    const model = system({
      tokens: [
        token('a', '{gone}'),
        token('b', '#777', { values: { dark: { hover: value('{gone}') } } }),
        token('c', '#777', {
          states: ['hover'],
          rules: {
            states: { hover: { towards: { direction: 'away', reference: { token: 'gone' } } } },
          },
        }),
        {
          ...token('d', '#777'),
          value: { kind: 'color', color: { l: 1.2, c: 0, h: 0, alpha: 1 } },
        },
      ],
      states: { hover: { towards: { direction: 'away', reference: { token: 'gone' } } } },
      pairs: [pair('gone', 'ground', { id: 'p', backdrop: ['lost'], themes: ['sepia'] })],
    })
    expect(
      faultsOf(model).map(({ code, token: id, pair: of }) => `${code} ${id ?? of ?? ''}`.trim()),
    ).toEqual([
      'reference-missing',
      'reference-missing a',
      'reference-missing b',
      'reference-missing c',
      'lightness-range d',
      'reference-missing p',
      'reference-missing p',
      'reference-missing p',
    ])
  })

  it('refuses a distinct set whose token is missing, also where an edit takes it away', () => {
    const set = { id: 's', name: 'Series', tokens: ['ink', 'gone'] }
    const missing = [{ code: 'reference-missing', distinctSet: 's' }]
    expect(faultsOf({ ...system(), distinctSets: [set] })).toMatchObject(missing)
    const gone = token('gone', '#777')
    const whole = evaluate({ ...system({ tokens: [gone] }), distinctSets: [set] })
    const edits = [
      { tokens: { remove: ['gone'] } },
      { distinctSets: { put: [{ ...set, tokens: ['ink', 'lost'] }] } },
    ]
    for (const edit of edits) {
      expect(recheck(whole, edit)).toMatchObject({ ok: false, faults: missing })
    }
  })
})
