import type { GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import type { PairModel, RuleScope } from '#shared/checks/model.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import {
  type Reading,
  readThemeKey,
  readThemeRule,
  readTokenName,
} from '#shared/contracts/wire-values.ts'
import type { FileTheme, ImportFile } from './import-file.ts'
import type { Identities } from './import-names.rules.ts'

export const MOST_THEMES = 8

export const tooManyThemes = (pointer: string): Fault => ({
  pointer,
  detail: `A system has at most ${MOST_THEMES} themes`,
})

/** Ground and ink for themes whose file does not tell them, by name. */
export interface Span {
  readonly ground?: string | undefined
  readonly ink?: string | undefined
}

interface ThemesOf {
  readonly index: SystemIndex
  readonly file: ImportFile
  readonly identities: Identities
  readonly reading: Reading
  readonly keeps: boolean
  readonly span: Span
}

/** The themes as they will be, the base first. */
export function themesOf(given: ThemesOf): readonly GovernedTheme[] {
  const { index, file, identities, reading, keeps } = given
  const standing = index.model.themes
  if (file.themes === undefined) return standing
  const [base] = keeps && standing.length > 0 ? standing : []
  const first = file.themes[0]
  if (base && first && identities.themes.get(first) !== base.id) {
    const detail = `The base theme of the file is ${first.key}, that of the system ${base.key}`
    reading.faults.push({ pointer: first.pointer, detail })
  }
  const put = new Map(
    file.themes.map((theme, at) => {
      const made = themeOf(theme, given, at === 0)
      return [made.id, made]
    }),
  )
  const merged = keeps ? standing.map((theme) => put.get(theme.id) ?? theme) : []
  const placed = new Set(merged.map(({ id }) => id))
  const themes = [...merged, ...[...put.values()].filter(({ id }) => !placed.has(id))]
  if (themes.length > MOST_THEMES) {
    reading.faults.push(tooManyThemes(file.themes[MOST_THEMES]?.pointer ?? ''))
  }
  return themes
}

function themeOf(
  theme: FileTheme,
  { index, file, identities, reading, span }: ThemesOf,
  isBase: boolean,
): GovernedTheme {
  const id = identities.themes.get(theme) ?? ''
  const standing = index.themesById.get(id)
  const kept = file.isWhole ? undefined : standing
  const { pointer, key, level = kept?.level } = theme
  const name = theme.name ?? standing?.name ?? titleOf(key)
  return {
    id,
    key,
    name,
    ...(isBase ? {} : { from: parentOf(theme, { file, kept, reading }) }),
    ground: roleOf(theme, 'ground', { given: theme.ground ?? span.ground, kept, reading }),
    ink: roleOf(theme, 'ink', { given: theme.ink ?? span.ink, kept, reading }),
    rule: theme.rule
      ? readThemeRule(theme.rule, `${pointer}/rule`, reading)
      : (kept?.rule ?? { kind: 'keep' }),
    ...(level === undefined ? {} : { level }),
    gating: theme.gating ?? kept?.gating ?? true,
  }
}

interface Kept {
  readonly kept: GovernedTheme | undefined
  readonly reading: Reading
}

function parentOf(
  { from, pointer }: FileTheme,
  { file, kept, reading }: Kept & { readonly file: ImportFile },
): string {
  if (from === undefined && kept?.from !== undefined) return kept.from
  return readThemeKey(from ?? file.themes?.[0]?.key ?? '', `${pointer}/from`, reading)
}

function roleOf(
  { key, pointer }: FileTheme,
  role: 'ground' | 'ink',
  { given, kept, reading }: Kept & { readonly given: string | undefined },
): string {
  if (given !== undefined) return readTokenName(given, `${pointer}/${role}`, reading)
  if (kept) return kept[role]
  const detail = `Which token is the ${role} of theme ${key}? Name it by the query parameter ${role}`
  reading.faults.push({ pointer, detail })
  return ''
}

const titleOf = (key: string) => key.charAt(0).toUpperCase() + key.slice(1).replaceAll('-', ' ')

/**
 * A file of another making gives each theme's colours and knows no rules: what it leaves out of a theme is as in
 * the base, and ground and ink are set in each theme itself, also where the system has them and the file has not.
 */
export function filledThemes(
  tokens: readonly GovernedToken[],
  themes: readonly GovernedTheme[],
  given: Pick<ThemesOf, 'file' | 'identities'> & { readonly put: readonly GovernedToken[] },
): readonly GovernedToken[] {
  const { file, identities } = given
  if (file.isWhole || file.themes === undefined) return tokens
  const spelt = new Set(given.put.map(({ id }) => id))
  const spoken = new Set(identities.themes.values())
  const derived = themes.filter((theme, at) => at > 0 && spoken.has(theme.id))
  return tokens.map((token) => {
    const missing = derived.filter(({ id, ground, ink, rule }) => {
      const isRole = ground === token.id || ink === token.id
      return (
        (isRole || (spelt.has(token.id) && rule.kind !== 'keep')) &&
        token.values[id]?.rest === undefined
      )
    })
    if (missing.length === 0) return token
    const filled = missing.map(({ id }) => [id, { ...token.values[id], rest: token.value }])
    return { ...token, values: { ...token.values, ...Object.fromEntries(filled) } }
  })
}

/** What is left of an item when themes are gone. */
export function withoutThemes<Scope extends RuleScope>(scope: Scope, gone: ReadonlySet<string>) {
  const { themes } = scope
  if (themes === undefined || !Object.keys(themes).some((id) => gone.has(id))) return scope
  return { ...scope, themes: withoutKeys(themes, gone) }
}

/** The same of a token's values and rules. */
export function tokenWithoutThemes(token: GovernedToken, gone: ReadonlySet<string>): GovernedToken {
  const hasValues = Object.keys(token.values).some((id) => gone.has(id))
  const rules = token.rules && withoutThemes(token.rules, gone)
  if (!hasValues && rules === token.rules) return token
  return { ...token, values: withoutKeys(token.values, gone), ...(rules ? { rules } : {}) }
}

/** The same of a pair; nothing where it occurred in those themes alone. */
export function pairWithoutThemes(
  pair: PairModel,
  gone: ReadonlySet<string>,
): PairModel | undefined {
  if (!pair.themes?.some((id) => gone.has(id))) return pair
  const themes = pair.themes.filter((id) => !gone.has(id))
  return themes.length === 0 ? undefined : { ...pair, themes }
}

const withoutKeys = <Value>(record: { readonly [key: string]: Value }, gone: ReadonlySet<string>) =>
  Object.fromEntries(Object.entries(record).filter(([key]) => !gone.has(key)))
