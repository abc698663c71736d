import type { StripBand } from '#console/ui/strip-geometry.ts'
import type { StripGrounds } from '#console/ui/strip-cloth.tsx'
import { relativeLuminance } from '#shared/color/luminance.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { StripTokenWire } from '#shared/contracts/tokens.contract.ts'

/** The two themes that the strip and its cells show, with their grounds as hex; the light one stands left. */
export interface StripThemes {
  readonly light: string
  readonly dark: string
  readonly grounds: StripGrounds
}

const luminanceOf = (hex: string): number =>
  relativeLuminance(
    Number.parseInt(hex.slice(1, 3), 16),
    Number.parseInt(hex.slice(3, 5), 16),
    Number.parseInt(hex.slice(5, 7), 16),
  )

/** The base theme and the first one of opposite polarity; `undefined` while a system has no ground to show. */
export function stripThemes(
  tokens: readonly StripTokenWire[],
  themes: readonly ThemeWire[],
): StripThemes | undefined {
  const hexes = tokens[0]?.hexes ?? {}
  const [base, opposite = base] = themes.filter(({ key }) => key in hexes)
  if (base === undefined || opposite === undefined) return undefined
  const ground = (theme: ThemeWire) =>
    tokens.find(({ name }) => name === theme.ground)?.hexes[theme.key]
  const [first, second] = [ground(base), ground(opposite)]
  if (first === undefined || second === undefined) return undefined
  return luminanceOf(first) >= luminanceOf(second)
    ? { light: base.key, dark: opposite.key, grounds: { light: first, dark: second } }
    : { light: opposite.key, dark: base.key, grounds: { light: second, dark: first } }
}

/** The side that a breach in a theme cuts: its own half, or the one whose ground is nearer to its own. */
export function sideOf(theme: ThemeWire, shown: StripThemes): 'light' | 'dark' {
  if (theme.key === shown.light) return 'light'
  if (theme.key === shown.dark) return 'dark'
  const lightness = groundLightness(theme)
  if (lightness === undefined) return 'light'
  // The lightness at which a grey is as far from black as from white is near to 0.57 in OKLCH.
  return lightness > 0.57 ? 'light' : 'dark'
}

function groundLightness(theme: ThemeWire): number | undefined {
  const value = theme.values[theme.ground]?.rest
  if (typeof value !== 'object' || !('colorSpace' in value)) return undefined
  const [first] = value.components
  return value.colorSpace === 'oklch' && typeof first === 'number' ? first : undefined
}

/** Which half is cut for a token that breaches in these themes. */
export function breachSide(
  themeKeys: readonly string[],
  themes: readonly ThemeWire[],
  shown: StripThemes,
): StripBand['breach'] {
  const sides = new Set(
    themes.filter(({ key }) => themeKeys.includes(key)).map((theme) => sideOf(theme, shown)),
  )
  return sides.size === 2 ? 'both' : [...sides][0]
}

export function bandsOf(
  tokens: readonly StripTokenWire[],
  themes: readonly ThemeWire[],
  shown: StripThemes,
  href: (name: string) => string,
): StripBand[] {
  return tokens.map((token) => {
    const breaches = token.mark === 'breach' || token.mark === 'breach-on-it'
    const side = breaches ? breachSide(token.themes, themes, shown) : undefined
    return {
      name: token.name,
      href: href(token.name),
      light: token.hexes[shown.light] ?? shown.grounds.light,
      dark: token.hexes[shown.dark] ?? shown.grounds.dark,
      ...(side === undefined ? {} : { breach: side }),
      ...(token.mark === 'breach-on-it' ? { breachOnIt: true } : {}),
    }
  })
}
