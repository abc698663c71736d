import { describe, expect, it } from 'vitest'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import { applyStateRule } from '#shared/checks/state-rule.ts'
import { stripThemes } from '#shared/checks/strip-themes.ts'
import { applyThemeRule } from '#shared/checks/theme-rule.ts'
import { DARK_GROUND, DARK_INK, system, theme, token, value } from './model-builder.ts'
import { read, resolve } from './reading.ts'

const grey = system({ tokens: [token('grey', '#888888', { states: ['hover'] })] })

describe('a wrong call', () => {
  it('refuses a token or a theme that the system does not have', () => {
    const resolved = resolve(grey)
    const at = (place: { token: string; theme: string }) =>
      colorOf(resolved, { ...place, state: 'rest' })
    expect(() => at({ token: 'gray', theme: 'light' })).toThrow(new TypeError('No token gray'))
    expect(() => at({ token: 'grey', theme: 'night' })).toThrow(new TypeError('No theme night'))
    expect(() => statesOf(resolved, 'gray')).toThrow(new TypeError('No token gray'))
    expect(statesOf(resolved, 'grey')).toEqual(['rest', 'hover'])
  })

  it('refuses a lightness step without a direction, and a theme rule without its two themes', () => {
    const rest = read(grey, 'grey')
    const towards = { direction: 'away', reference: 'ground' } as const
    const rule = { lightness: 0.05, chroma: 1, hue: 0, alpha: 1, towards }
    const step = { state: 'hover', rule, direction: undefined } as const
    expect(() => applyStateRule(rest, step)).toThrow(TypeError)
    expect(() => applyThemeRule(rest, { kind: 'mirror' }, undefined)).toThrow(TypeError)
    expect(applyThemeRule(rest, { kind: 'shift' }, undefined).color).toMatchObject({
      oklch: rest.oklch,
    })
  })
})

describe('the themes of a strip', () => {
  const ids = (model: Parameters<typeof resolve>[0]) =>
    stripThemes(resolve(model)).map(({ id }) => id)

  it('answers the base and the first theme of the opposite polarity', () => {
    expect(ids(system({ themes: [theme('light'), theme('kiosk'), theme('dark')] }))).toEqual([
      'light',
      'dark',
    ])
  })

  it('answers the base alone where all stand alike, and nothing without a theme', () => {
    expect(ids(system({ themes: [theme('light'), theme('kiosk')] }))).toEqual(['light'])
    expect(ids(system({ themes: [] }))).toEqual([])
  })

  it('answers a ground without lightness as black', () => {
    const missing = { kind: 'color', color: { l: null, c: 0, h: null, alpha: 1 } } as const
    const model = system({ themes: [theme('light'), theme('dark')] })
    const [ground, ink] = model.tokens
    const put = (dark: Record<'ground' | 'ink', typeof missing | ReturnType<typeof value>>) => [
      { ...ground!, values: { dark: { rest: dark.ground } } },
      { ...ink!, values: { dark: { rest: dark.ink } } },
    ]
    const night = { ...model, tokens: put({ ground: missing, ink: value(DARK_INK) }) }
    expect(ids(night)).toEqual(['light', 'dark'])
    const day = { ...model, tokens: put({ ground: value(DARK_INK), ink: missing }) }
    expect(ids(day)).toEqual(['light'])
    expect(
      ids({ ...model, tokens: put({ ground: value(DARK_GROUND), ink: value(DARK_INK) }) }),
    ).toEqual(['light', 'dark'])
  })
})
