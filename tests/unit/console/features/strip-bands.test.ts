import { describe, expect, it } from 'vitest'
import { bandsOf, breachSide, stripThemes } from '#console/features/tokens/strip-bands.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { StripTokenWire } from '#shared/contracts/tokens.contract.ts'

const theme = (key: string, lightness?: number): ThemeWire => ({
  id: `thm_${key}`,
  key,
  name: key,
  position: 0,
  ground: 'deck',
  ink: 'ink',
  rule: {},
  gating: true,
  values:
    lightness === undefined
      ? {}
      : { deck: { rest: { colorSpace: 'oklch', components: [lightness, 0, 0] } } },
  etag: '"1"',
})
const strip = (
  name: string,
  hexes: Record<string, string>,
  mark: StripTokenWire['mark'] = null,
  themes: string[] = [],
): StripTokenWire => ({ name, hexes, mark, themes })

const themes = [theme('night', 0.2), theme('day', 0.98), theme('kiosk', 0.99), theme('deep', 0.1)]
const tokens = [
  strip('deck', { night: '#0a1020', day: '#fafafa' }, 'breach-on-it', ['day']),
  strip('ink', { night: '#ffffff', day: '#101010' }, 'breach', ['night', 'kiosk']),
]

describe('the bands of the strip', () => {
  it('answers the lighter ground as the left half, also where the base is dark', () => {
    expect(stripThemes(tokens, themes)).toEqual({
      light: 'day',
      dark: 'night',
      grounds: { light: '#fafafa', dark: '#0a1020' },
    })
  })

  it('answers no theme where there is no token', () => {
    expect(stripThemes([], themes)).toBeUndefined()
  })

  const shown = stripThemes(tokens, themes)!

  it('answers a breach in its own half, and in the half of the nearer ground for any other theme', () => {
    expect(breachSide(['day'], themes, shown)).toBe('light')
    expect(breachSide(['kiosk'], themes, shown)).toBe('light')
    expect(breachSide(['deep'], themes, shown)).toBe('dark')
    expect(breachSide(['night', 'kiosk'], themes, shown)).toBe('both')
  })

  it('answers bands with their colours, their notch, and the thinner stitch of a background', () => {
    expect(bandsOf(tokens, themes, shown, (name) => `/${name}`)).toEqual([
      {
        name: 'deck',
        href: '/deck',
        light: '#fafafa',
        dark: '#0a1020',
        breach: 'light',
        breachOnIt: true,
      },
      { name: 'ink', href: '/ink', light: '#101010', dark: '#ffffff', breach: 'both' },
    ])
  })
})
