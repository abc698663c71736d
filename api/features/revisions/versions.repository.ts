import { createHash } from 'node:crypto'
import { type AnyColumn, and, eq, inArray, max, type SQL, sql } from 'drizzle-orm'
import type { PairModel, SystemSettings } from '#shared/checks/model.ts'
import { declarationOf } from '#shared/checks/pair-declaration.ts'
import type { Executor } from '#api/platform/database.ts'
import { STILL_LIVE } from '#drizzle/schema/columns.ts'
import { distinctSets, distinctSetVersions } from '#drizzle/schema/distinct-sets.ts'
import { documentVersions } from '#drizzle/schema/documents.ts'
import { pairs, pairVersions } from '#drizzle/schema/pairs.ts'
import { ruleVersions } from '#drizzle/schema/rules.ts'
import { settingVersions } from '#drizzle/schema/systems.ts'
import { themes, themeVersions } from '#drizzle/schema/themes.ts'
import { tokens, tokenVersions } from '#drizzle/schema/tokens.ts'
import type { VersionChanges } from './version-changes.rules.ts'
import { pairToRow, prefixToRow, setToRow, themeToRow, tokenToRow } from './version-rows.ts'

/** The revision that versions begin and end with. */
export interface Turn {
  readonly systemId: string
  readonly revision: number
}

/** Writes what a revision changes; call it under the head's lock. */
export function createVersionsRepository(db: Executor) {
  return {
    async write(turn: Turn, changes: VersionChanges): Promise<void> {
      await closeVersions(db, turn, changes)
      await openTokens(db, turn, changes.tokens)
      await openThemes(db, turn, changes.themes)
      await openPairs(db, turn, changes.pairs)
      await openRules(db, turn, changes)
      await openDistinctSets(db, turn, changes.distinctSets)
      if (changes.settings) await openSettings(db, turn, changes.settings)
      if (changes.remainder !== undefined) await replaceRemainder(db, turn, changes.remainder)
    },
  }
}

/** One statement has 16 MiB at most; an import brings tens of thousands of rows. */
const ROWS_AT_ONCE = 1000

async function inSlices<Row>(
  rows: readonly Row[],
  write: (slice: Row[]) => PromiseLike<unknown>,
): Promise<void> {
  for (let at = 0; at < rows.length; at += ROWS_AT_ONCE) {
    await write(rows.slice(at, at + ROWS_AT_ONCE))
  }
}

const begin = ({ systemId, revision }: Turn) => ({ systemId, fromRevision: revision })

async function closeVersions(db: Executor, { systemId, revision }: Turn, changes: VersionChanges) {
  const end = { toRevision: revision }
  const live = (table: { systemId: AnyColumn; toRevision: AnyColumn }, which: SQL) =>
    and(eq(table.systemId, systemId), eq(table.toRevision, STILL_LIVE), which)
  const { tokens: token, pairs: pair, themes: theme, prefixes: prefix } = changes
  if (token.closed.length > 0) {
    const which = inArray(tokenVersions.tokenId, [...token.closed])
    await db.update(tokenVersions).set(end).where(live(tokenVersions, which))
  }
  if (pair.closed.length > 0) {
    const which = inArray(pairVersions.pairId, [...pair.closed])
    await db.update(pairVersions).set(end).where(live(pairVersions, which))
  }
  if (theme.closed.length > 0) {
    const which = inArray(themeVersions.themeId, [...theme.closed])
    await db.update(themeVersions).set(end).where(live(themeVersions, which))
  }
  if (changes.distinctSets.closed.length > 0) {
    const which = inArray(distinctSetVersions.setId, [...changes.distinctSets.closed])
    await db.update(distinctSetVersions).set(end).where(live(distinctSetVersions, which))
  }
  const prefixes =
    prefix.closed.length > 0 ? inArray(ruleVersions.prefix, [...prefix.closed]) : null
  if (prefixes) {
    const which = sql`${eq(ruleVersions.scope, 'prefix')} and ${prefixes}`
    await db.update(ruleVersions).set(end).where(live(ruleVersions, which))
  }
  if (changes.states) {
    await db
      .update(ruleVersions)
      .set(end)
      .where(live(ruleVersions, eq(ruleVersions.scope, 'system')))
  }
  if (changes.settings) {
    await db.update(settingVersions).set(end).where(live(settingVersions, sql`true`))
  }
}

async function openTokens(db: Executor, turn: Turn, { opened, added }: VersionChanges['tokens']) {
  if (opened.length === 0) return
  if (added.length > 0) {
    const [last] = await db
      .select({ position: max(tokens.position) })
      .from(tokens)
      .where(eq(tokens.systemId, turn.systemId))
    await inSlices(placed(turn, added, last?.position ?? -1), (rows) =>
      db.insert(tokens).values(rows),
    )
  }
  await inSlices(
    opened.map(({ item }) => ({ ...begin(turn), ...tokenToRow(item) })),
    (rows) => db.insert(tokenVersions).values(rows),
  )
}

async function openPairs(db: Executor, turn: Turn, { opened, added }: VersionChanges['pairs']) {
  if (opened.length === 0) return
  if (added.length > 0) {
    const [last] = await db
      .select({ position: max(pairs.position) })
      .from(pairs)
      .where(eq(pairs.systemId, turn.systemId))
    await inSlices(placed(turn, added, last?.position ?? -1), (rows) =>
      db.insert(pairs).values(rows),
    )
  }
  const rows = opened.map(({ item }) => ({
    ...begin(turn),
    ...pairToRow(item),
    declarationHash: declarationHash(item),
  }))
  await inSlices(rows, (slice) => db.insert(pairVersions).values(slice))
}

async function openThemes(db: Executor, turn: Turn, { opened, added }: VersionChanges['themes']) {
  if (opened.length === 0) return
  if (added.length > 0) {
    await db.insert(themes).values(added.map((id) => ({ id, systemId: turn.systemId })))
  }
  const rows = opened.map(({ item, position }) => ({
    ...begin(turn),
    ...themeToRow(item),
    position,
  }))
  await db.insert(themeVersions).values(rows)
}

async function openRules(db: Executor, turn: Turn, { prefixes, states }: VersionChanges) {
  const rows = prefixes.opened.map(({ item, position }) => ({
    ...begin(turn),
    ...prefixToRow(item),
    scope: 'prefix' as const,
    position,
  }))
  if (rows.length > 0) await db.insert(ruleVersions).values(rows)
  if (states) {
    await db
      .insert(ruleVersions)
      .values({ ...begin(turn), scope: 'system', definition: { states } })
  }
}

async function openDistinctSets(
  db: Executor,
  turn: Turn,
  { opened, added }: VersionChanges['distinctSets'],
) {
  if (opened.length === 0) return
  if (added.length > 0) {
    await db.insert(distinctSets).values(added.map((id) => ({ id, systemId: turn.systemId })))
  }
  await db
    .insert(distinctSetVersions)
    .values(opened.map(({ item }) => ({ ...begin(turn), ...setToRow(item) })))
}

const openSettings = (db: Executor, turn: Turn, definition: SystemSettings) =>
  db.insert(settingVersions).values({ ...begin(turn), definition })

/** What files brought besides is one document: its pointer is that of the whole. */
async function replaceRemainder(db: Executor, turn: Turn, content: string | null): Promise<void> {
  const { systemId, revision } = turn
  await db
    .update(documentVersions)
    .set({ toRevision: revision })
    .where(
      and(eq(documentVersions.systemId, systemId), eq(documentVersions.toRevision, STILL_LIVE)),
    )
  if (content === null) return
  await db.insert(documentVersions).values({ ...begin(turn), pointer: '', content })
}

const placed = ({ systemId }: Turn, ids: readonly string[], last: number) =>
  ids.map((id, at) => ({ id, systemId, position: last + 1 + at }))

const declarationHash = (pair: PairModel) =>
  createHash('sha256').update(declarationOf(pair)).digest('hex')
