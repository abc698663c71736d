import { colorOf, type ResolvedSystem } from './resolved.ts'
import type { ThemeModel } from './model.ts'

/**
 * The themes that a strip shows: the base, and the first whose ground and ink stand the other way round in
 * lightness. None of a system without themes, one where all stand alike.
 */
export function stripThemes(resolved: ResolvedSystem): ThemeModel[] {
  const { themes } = resolved.model
  const lightnessOf = (token: string, theme: string) =>
    colorOf(resolved, { token, theme, state: 'rest' }).oklch.l ?? 0
  const isDark = ({ id, ground, ink }: ThemeModel) => lightnessOf(ground, id) < lightnessOf(ink, id)
  const [base] = themes
  if (base === undefined) return []
  const opposite = themes.find((theme) => isDark(theme) !== isDark(base))
  return opposite === undefined ? [base] : [base, opposite]
}
