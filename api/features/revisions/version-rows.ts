import type { DistinctSet, PairModel, PrefixRules } from '#shared/checks/model.ts'
import type { GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import type { DistinctSetDefinition } from '#drizzle/schema/distinct-sets.ts'
import type { PairDefinition } from '#drizzle/schema/pairs.ts'
import type { ThemeDefinition } from '#drizzle/schema/themes.ts'
import type { TokenDefinition } from '#drizzle/schema/tokens.ts'

/** The versions' own columns of a token. */
export interface TokenRow {
  readonly tokenId: string
  readonly name: string
  readonly definition: TokenDefinition
}

export const tokenFromRow = ({ tokenId, name, definition }: TokenRow): GovernedToken => ({
  id: tokenId,
  name,
  ...definition,
})

export function tokenToRow({ id, name, ...definition }: GovernedToken): TokenRow {
  return { tokenId: id, name, definition }
}

/** The versions' own columns of a pair. */
export interface PairRow {
  readonly pairId: string
  readonly foregroundTokenId: string
  readonly backgroundTokenId: string
  readonly use: PairModel['use']
  readonly definition: PairDefinition
}

export const pairFromRow = (row: PairRow): PairModel => ({
  id: row.pairId,
  foreground: row.foregroundTokenId,
  background: row.backgroundTokenId,
  use: row.use,
  ...row.definition,
})

export function pairToRow({ id, foreground, background, use, ...definition }: PairModel): PairRow {
  return {
    pairId: id,
    foregroundTokenId: foreground,
    backgroundTokenId: background,
    use,
    definition,
  }
}

/** The versions' own columns of a theme. */
export interface ThemeRow {
  readonly themeId: string
  readonly key: string
  readonly gating: boolean
  readonly definition: ThemeDefinition
}

export function themeFromRow({ themeId, key, gating, definition }: ThemeRow): GovernedTheme {
  const { rule = { kind: 'keep' }, ...rest } = definition
  return { id: themeId, key, gating, rule, ...rest }
}

export function themeToRow({ id, key, gating, ...definition }: GovernedTheme): ThemeRow {
  return { themeId: id, key, gating, definition }
}

/** The versions' own columns of a distinct set. */
export interface SetRow {
  readonly setId: string
  readonly name: string
  readonly definition: DistinctSetDefinition
}

export const setFromRow = ({ setId, name, definition }: SetRow): DistinctSet => ({
  id: setId,
  name,
  tokens: definition.tokens,
})

export const setToRow = ({ id, name, tokens }: DistinctSet): SetRow => ({
  setId: id,
  name,
  definition: { tokens },
})

export function prefixToRow({ prefix, ...definition }: PrefixRules) {
  return { prefix, definition }
}
