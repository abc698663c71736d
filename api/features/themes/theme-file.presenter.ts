import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { GovernedSystem, GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import type { THEME_FORMATS } from '#shared/contracts/themes.contract.ts'
import { themeCss } from '#shared/formats/theme-css.ts'
import { themeJson } from '#shared/formats/theme-json.ts'
import type { ThemeToken } from '#shared/formats/theme-tokens.ts'

export type ThemeFormat = (typeof THEME_FORMATS)[number]

/** A theme as a file, or why its tokens cannot be written in that format. */
export type PresentedFile =
  | { readonly ok: true; readonly file: { readonly text: string; readonly media: string } }
  | { readonly ok: false; readonly details: readonly string[] }

interface MeasuredModel {
  readonly model: GovernedSystem
  readonly evaluation: Evaluation
}

/** Writes a theme, resolved, in one format. */
export function presentThemeFile(
  system: MeasuredModel,
  theme: GovernedTheme,
  format: ThemeFormat,
): PresentedFile {
  const tokens = system.model.tokens.map((token) => themeToken(system, theme, token))
  if (format === 'css') {
    const written = themeCss(tokens, system.model.settings.p3)
    return written.ok
      ? { ok: true, file: { text: written.css, media: 'text/css; charset=utf-8' } }
      : { ok: false, details: written.collisions.map(({ detail }) => detail) }
  }
  const written = themeJson(tokens)
  if (!written.ok) return { ok: false, details: written.conflicts.map(({ detail }) => detail) }
  const text = `${JSON.stringify(written.document, undefined, 2)}\n`
  return { ok: true, file: { text, media: 'application/design-tokens+json' } }
}

function themeToken(
  { evaluation }: MeasuredModel,
  theme: GovernedTheme,
  { id, name, description, deprecated }: GovernedToken,
): ThemeToken {
  const states = statesOf(evaluation.resolved, id).map((state) => {
    const { rendered } = colorOf(evaluation.resolved, { token: id, theme: theme.id, state })
    return { state, rendered }
  })
  return {
    name,
    ...(description === undefined ? {} : { description }),
    ...(deprecated === undefined ? {} : { deprecated: deprecated.reason ?? true }),
    states,
  }
}
