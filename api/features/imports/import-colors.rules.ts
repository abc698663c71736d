import { colorOf, type ResolvedSystem, statesOf } from '#shared/checks/resolved.ts'
import { stripThemes } from '#shared/checks/strip-themes.ts'
import { formatHex } from '#shared/color/format-color.ts'

type ByTheme<Shown> = Readonly<Record<string, Shown>>

/** What the strip shows of a system: its grounds, and a token in each of its states. */
export interface ShownColors {
  readonly grounds: ByTheme<string>
  readonly of: (tokenId: string) => ByTheme<Readonly<Record<string, string>>>
}

/** Reads the colours that the strip shows, as hex. */
export function shownColors(resolved: ResolvedSystem): ShownColors {
  const themes = stripThemes(resolved)
  const hexIn = (theme: string, token: string, state: ReturnType<typeof statesOf>[number]) => {
    const { r, g, b, a } = colorOf(resolved, { token, theme, state }).rendered
    return formatHex(r, g, b, a)
  }
  return {
    grounds: Object.fromEntries(
      themes.map(({ id, key, ground }) => [key, hexIn(id, ground, 'rest')]),
    ),
    of: (token) => {
      const states = statesOf(resolved, token)
      return Object.fromEntries(
        themes.map(({ id, key }) => [
          key,
          Object.fromEntries(states.map((state) => [state, hexIn(id, token, state)])),
        ]),
      )
    },
  }
}
