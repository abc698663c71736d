import { describe, expect, it } from 'vitest'
import type { SourceValue, ThemeModel } from '#shared/checks/model.ts'
import { statesOf } from '#shared/checks/resolved.ts'
import { system, theme, token, value } from './model-builder.ts'
import { hexAt, lightnessAt, read, resolve } from './reading.ts'

const SHIFT = { kind: 'shift', lightness: 0.1 } as const
const derived = (target: string, more: object = {}): SourceValue => ({
  kind: 'derived',
  token: target,
  ...more,
})

describe('found values', () => {
  const chain: ThemeModel[] = [
    theme('light'),
    theme('dark', { rule: SHIFT }),
    theme('kiosk', { from: 'dark', rule: SHIFT }),
  ]

  it('answers the value of the nearest theme, ruled where it is not the theme’s own', () => {
    const t = token('t', 'oklch(0.2 0 0)', { values: { dark: { rest: value('oklch(0.5 0 0)') } } })
    const model = system({ themes: chain, tokens: [t] })
    expect(lightnessAt(model, 't dark')).toBe(0.5)
    expect(lightnessAt(model, 't kiosk')).toBeCloseTo(0.6, 12)
    expect(read(model, 't dark').provenance).toEqual({ from: 'override' })
    expect(read(model, 't').provenance).toEqual({ from: 'source' })
  })

  it('answers a state set in the parent by the theme’s rule on it', () => {
    const t = token('t', 'oklch(0.2 0 0)', {
      states: ['hover'],
      values: { light: { hover: value('oklch(0.7 0 0)') } },
    })
    expect(lightnessAt(system({ themes: chain, tokens: [t] }), 't dark hover')).toBeCloseTo(0.8, 12)
  })

  it('leaves a state’s value aside where a nearer theme sets rest', () => {
    const t = token('t', 'oklch(0.2 0 0)', {
      states: ['hover'],
      values: {
        light: { hover: value('oklch(0.7 0 0)') },
        dark: { rest: value('oklch(0.5 0 0)') },
      },
    })
    const model = system({ themes: chain, tokens: [t] })
    expect(lightnessAt(model, 't dark hover')).toBeCloseTo(0.55, 12)
    // In the grandchild too: the parent's rest is nearer than the base's hover.
    // Its white ground makes away darker.
    expect(lightnessAt(model, 't kiosk hover')).toBeCloseTo(0.55, 12)
  })

  it('answers a state set beside rest in the same theme', () => {
    const both = { rest: value('oklch(0.5 0 0)'), hover: value('oklch(0.9 0 0)') }
    const t = token('t', 'oklch(0.2 0 0)', { states: ['hover'], values: { dark: both } })
    expect(lightnessAt(system({ themes: chain, tokens: [t] }), 't dark hover')).toBe(0.9)
  })
})

describe('aliases', () => {
  it('answers the target in the same theme, not the rule of the theme on the alias', () => {
    const board = token('board', 'oklch(0.3 0 0)', {
      values: { dark: { rest: value('oklch(0.8 0 0)') } },
    })
    const model = system({ tokens: [board, token('t', '{board}')], dark: { rule: SHIFT } })
    expect(lightnessAt(model, 't dark')).toBe(0.8)
    expect(read(model, 't dark').provenance).toEqual({
      from: 'alias',
      token: 'board',
      state: 'rest',
    })
  })

  it('leaves an alias dead behind a theme rule of the token’s own, whatever its field', () => {
    const board = token('board', 'oklch(0.3 0.1 0)', {
      values: { dark: { rest: value('oklch(0.8 0 0)') } },
    })
    const own = { rules: { themes: { dark: { chroma: 0.5 } } } }
    const model = system({ tokens: [board, token('t', '{board}', own)], dark: { rule: SHIFT } })
    expect(lightnessAt(model, 't dark')).toBeCloseTo(0.4, 12)
    expect(read(model, 't dark').oklch.c).toBeCloseTo(0.05, 12)
    const empty = token('t', '{board}', { rules: { themes: { dark: {} } } })
    expect(lightnessAt(system({ tokens: [board, empty], dark: { rule: SHIFT } }), 't dark')).toBe(
      0.8,
    )
  })

  it('leaves an alias dead in the grandchild where the rule lies between', () => {
    const board = token('board', 'oklch(0.3 0.1 0)', {
      values: { kiosk: { rest: value('oklch(0.8 0 0)') } },
    })
    const themes = [
      theme('light'),
      theme('dark', { rule: SHIFT }),
      theme('kiosk', { from: 'dark' }),
    ]
    const own = { rules: { themes: { dark: SHIFT } } }
    const model = system({ themes, tokens: [board, token('t', '{board}', own)] })
    expect(lightnessAt(model, 't kiosk')).toBeCloseTo(0.4, 12)
    // A prefix rule is not the token's own.
    const prefixes = [{ prefix: 't', themes: { dark: SHIFT } }]
    const wide = system({ themes, prefixes, tokens: [board, token('t', '{board}')] })
    expect(lightnessAt(wide, 't kiosk')).toBe(0.8)
  })

  it('answers the states of its target where it lists none, along a chain', () => {
    const model = system({
      tokens: [token('c', '{b}'), token('b', '{a}'), token('a', '#777', { states: ['active'] })],
    })
    expect(statesOf(resolve(model), 'c')).toEqual(['rest', 'active'])
    expect(statesOf(resolve(model), 'ink')).toEqual(['rest'])
  })

  it('answers a state as its target’s where the target lists it and no own state rule stands', () => {
    const a = token('a', 'oklch(0.6 0 0)', {
      states: ['hover'],
      values: { light: { hover: value('#ff0000') } },
    })
    const b = token('b', '{a}', { states: ['hover', 'active'] })
    const model = system({ tokens: [a, b] })
    expect(hexAt(model, 'b hover')).toBe('#ff0000')
    // Active the target does not list: from b's own rest.
    expect(lightnessAt(model, 'b active')).toBeCloseTo(0.5, 12)
    const own = token('b', '{a}', {
      states: ['hover', 'active'],
      rules: { states: { hover: { chroma: 1 } } },
    })
    // Active is the larger step; hover takes its direction and its own 0.05.
    expect(lightnessAt(system({ tokens: [a, own] }), 'b hover')).toBeCloseTo(0.55, 12)
  })

  it('answers a state’s alias by the target’s rest, unless rest aliases the same target', () => {
    const a = token('a', '#777777', {
      states: ['hover'],
      values: { light: { hover: value('#ff0000') } },
    })
    const apart = token('b', '#333', {
      states: ['hover'],
      values: { light: { hover: value('{a}') } },
    })
    const same = token('c', '{a}', {
      states: ['hover'],
      values: { light: { hover: value('{a}') } },
    })
    const model = system({ tokens: [a, apart, same] })
    expect(hexAt(model, 'b hover')).toBe('#777777')
    expect(hexAt(model, 'c hover')).toBe('#ff0000')
  })
})

describe('derived tokens', () => {
  it('answers lightness and hue added, chroma and alpha multiplied, live in every theme', () => {
    const a = token('a', 'oklch(0.5 0.1 350 / 0.8)', {
      values: { dark: { rest: value('oklch(0.9 0.2 10)') } },
    })
    const t = {
      ...token('t', '#000'),
      value: derived('a', { lightness: 0.2, chroma: 0.5, hue: 20, alpha: 0.5 }),
    }
    const model = system({ tokens: [a, t], dark: { rule: SHIFT } })
    const { oklch } = read(model, 't')
    expect([oklch.l, oklch.c, oklch.h, oklch.alpha]).toEqual([0.7, 0.05, 10, 0.4])
    expect(read(model, 't dark').oklch).toMatchObject({ l: 1, c: 0.1, h: 30, alpha: 0.5 })
  })

  it('answers only its own states, each from its state rule on its own rest', () => {
    const a = token('a', 'oklch(0.6 0 0)', {
      states: ['hover', 'active'],
      values: { light: { hover: value('#ff0000') } },
    })
    const t = {
      ...token('t', '#000', { states: ['hover'] }),
      value: derived('a', { lightness: -0.1 }),
    }
    const model = system({ tokens: [a, t] })
    expect(statesOf(resolve(model), 't')).toEqual(['rest', 'hover'])
    expect(lightnessAt(model, 't hover')).toBeCloseTo(0.45, 12)
    const silent = { ...token('t', '#000'), value: derived('a') }
    expect(statesOf(resolve(system({ tokens: [a, silent] })), 't')).toEqual(['rest'])
  })

  it('leaves a derivation dead behind a theme rule of its own', () => {
    const a = token('a', 'oklch(0.5 0 0)', { values: { dark: { rest: value('#fff') } } })
    const own = { rules: { themes: { dark: SHIFT } } }
    const t = { ...token('t', '#000', own), value: derived('a', { lightness: 0.2 }) }
    expect(lightnessAt(system({ tokens: [a, t] }), 't dark')).toBeCloseTo(0.8, 12)
  })
})

it('leaves a multiplied chroma finite, so that it can be stored and sent', () => {
  const tokens = [
    token('t', 'oklch(0.5 1e308 40)'),
    { ...token('far', '#fff'), value: derived('t', { chroma: 10 }) },
  ]
  const { c } = read(system({ themes: [theme('light')], tokens }), 'far').oklch
  expect(c).toBe(Number.MAX_VALUE)
  expect(JSON.stringify(c)).not.toBe('null')
})
