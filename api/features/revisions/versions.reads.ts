import { and, asc, between, eq, getTableColumns, gt, lte, or, type SQL, sql } from 'drizzle-orm'
import { alias, type MySqlColumn } from 'drizzle-orm/mysql-core'
import type { ItemEdits } from '#shared/checks/edits.ts'
import type {
  DistinctSet,
  PairModel,
  PrefixRules,
  StateRules,
  SystemSettings,
} from '#shared/checks/model.ts'
import type {
  GovernedEdits,
  GovernedSystem,
  GovernedTheme,
  GovernedToken,
} from '#shared/checks/governed-model.ts'
import type { Executor } from '#api/platform/database.ts'
import { distinctSetVersions } from '#drizzle/schema/distinct-sets.ts'
import { documentVersions } from '#drizzle/schema/documents.ts'
import { pairs, pairVersions } from '#drizzle/schema/pairs.ts'
import { ruleVersions } from '#drizzle/schema/rules.ts'
import { settingVersions } from '#drizzle/schema/systems.ts'
import { themeVersions } from '#drizzle/schema/themes.ts'
import { tokens, tokenVersions } from '#drizzle/schema/tokens.ts'
import { pairFromRow, setFromRow, themeFromRow, tokenFromRow } from './version-rows.ts'

type Versions =
  | typeof tokenVersions
  | typeof pairVersions
  | typeof themeVersions
  | typeof ruleVersions
  | typeof settingVersions
  | typeof documentVersions
  | typeof distinctSetVersions

/** Revisions after `after` up to and with `upTo`. */
export interface RevisionSpan {
  readonly systemId: string
  readonly after: number
  readonly upTo: number
}

/** Reads governed systems out of their versions. What is read at a revision never changes again. */
export function createVersionsReads(db: Executor) {
  const systemAt = async (systemId: string, revision: number): Promise<GovernedSystem> => ({
    settings: await settingsAt(db, systemId, revision),
    ...(await rulesAt(db, systemId, revision)),
    themes: await themesAt(db, systemId, revision),
    tokens: await readTokens(db, inForce(tokenVersions, systemId, revision)),
    pairs: await readPairs(db, inForce(pairVersions, systemId, revision)),
    ...(await distinctSetsAt(db, systemId, revision)),
    ...(await remainderAt(db, systemId, revision)),
  })
  const editsIn = (span: RevisionSpan): Promise<GovernedEdits> => readEdits(db, span)
  return { systemAt, editsIn }
}
export type VersionsReads = ReturnType<typeof createVersionsReads>

const inForce = (table: Versions, systemId: string, revision: number) =>
  and(
    eq(table.systemId, systemId),
    gt(table.toRevision, revision),
    lte(table.fromRevision, revision),
  )

/** Versions in force at the end of the span that were not at its start. */
const begun = (table: Versions, { systemId, after, upTo }: RevisionSpan) =>
  and(
    eq(table.systemId, systemId),
    between(table.fromRevision, after + 1, upTo),
    gt(table.toRevision, upTo),
  )

/** Versions in force at the start of the span that are not at its end. */
const ended = (table: Versions, { systemId, after, upTo }: RevisionSpan) =>
  and(
    eq(table.systemId, systemId),
    between(table.toRevision, after + 1, upTo),
    lte(table.fromRevision, after),
  )

/** Reads the versions that a condition finds, in the order of their items. */
type ReadItems<Item> = (db: Executor, found: SQL | undefined) => Promise<Item[]>

const readTokens: ReadItems<GovernedToken> = async (db, found) => {
  const rows = await db
    .select(tokenColumns)
    .from(tokenVersions)
    .innerJoin(tokens, eq(tokens.id, tokenVersions.tokenId))
    .where(found)
    .orderBy(asc(tokens.position))
  return rows.map(tokenFromRow)
}

const readPairs: ReadItems<PairModel> = async (db, found) => {
  const rows = await db
    .select(pairColumns)
    .from(pairVersions)
    .innerJoin(pairs, eq(pairs.id, pairVersions.pairId))
    .where(found)
    .orderBy(asc(pairs.position))
  return rows.map(pairFromRow)
}

const readDistinctSets: ReadItems<DistinctSet> = async (db, found) => {
  const rows = await db
    .select(setColumns)
    .from(distinctSetVersions)
    .where(found)
    .orderBy(setMadeAt, asc(distinctSetVersions.setId))
  return rows.map(setFromRow)
}

/** A system without any has no such member. */
async function distinctSetsAt(db: Executor, systemId: string, revision: number) {
  const distinctSets = await readDistinctSets(db, inForce(distinctSetVersions, systemId, revision))
  return distinctSets.length > 0 ? { distinctSets } : {}
}

async function themesAt(
  db: Executor,
  systemId: string,
  revision: number,
): Promise<GovernedTheme[]> {
  const rows = await db
    .select()
    .from(themeVersions)
    .where(inForce(themeVersions, systemId, revision))
    .orderBy(asc(themeVersions.position))
  return rows.map(themeFromRow)
}

async function rulesAt(
  db: Executor,
  systemId: string,
  revision: number,
): Promise<{ states: StateRules; prefixes: PrefixRules[] }> {
  const rows = await db
    .select()
    .from(ruleVersions)
    .where(inForce(ruleVersions, systemId, revision))
    .orderBy(asc(ruleVersions.position))
  const system = rows.find(({ scope }) => scope === 'system')
  return {
    states: system?.definition.states ?? {},
    prefixes: rows
      .filter(({ scope }) => scope === 'prefix')
      .map(({ prefix, definition }) => ({ prefix, ...definition })),
  }
}

async function settingsAt(
  db: Executor,
  systemId: string,
  revision: number,
): Promise<SystemSettings> {
  const [row] = await db
    .select({ definition: settingVersions.definition })
    .from(settingVersions)
    .where(inForce(settingVersions, systemId, revision))
  if (row === undefined) throw new TypeError(`No revision ${revision} of ${systemId}`)
  return row.definition
}

async function remainderAt(
  db: Executor,
  systemId: string,
  revision: number,
): Promise<{ remainder?: string }> {
  const [row] = await db
    .select({ content: documentVersions.content })
    .from(documentVersions)
    .where(inForce(documentVersions, systemId, revision))
  return row === undefined ? {} : { remainder: row.content }
}

/** Only what the span touched is read, so that following a head costs what was edited. */
async function readEdits(db: Executor, span: RevisionSpan): Promise<GovernedEdits> {
  const { systemId, upTo } = span
  return {
    tokens: await itemEdits(db, span, TOKENS),
    pairs: await itemEdits(db, span, PAIRS),
    distinctSets: await itemEdits(db, span, DISTINCT_SETS),
    ...((await isTouched(db, themeVersions, span))
      ? { themes: await themesAt(db, systemId, upTo) }
      : {}),
    ...((await isTouched(db, ruleVersions, span)) ? await rulesAt(db, systemId, upTo) : {}),
    ...((await isTouched(db, settingVersions, span))
      ? { settings: await settingsAt(db, systemId, upTo) }
      : {}),
    ...((await isTouched(db, documentVersions, span))
      ? { remainder: null, ...(await remainderAt(db, systemId, upTo)) }
      : {}),
  }
}

interface ItemKind<Item> {
  readonly versions: typeof tokenVersions | typeof pairVersions | typeof distinctSetVersions
  /** The item's id in its versions. */
  readonly id: MySqlColumn & { readonly _: { readonly data: string } }
  readonly read: ReadItems<Item>
}

async function itemEdits<Item>(
  db: Executor,
  span: RevisionSpan,
  { versions, id, read }: ItemKind<Item>,
): Promise<ItemEdits<Item>> {
  const put = await read(db, begun(versions, span))
  const gone = await db.select({ id }).from(versions).where(ended(versions, span))
  return { put, remove: gone.map((row) => row.id) }
}

async function isTouched(db: Executor, table: Versions, span: RevisionSpan): Promise<boolean> {
  const [row] = await db
    .select({ systemId: table.systemId })
    .from(table)
    .where(or(begun(table, span), ended(table, span)))
    .limit(1)
  return row !== undefined
}

const { tokenId, name, definition } = getTableColumns(tokenVersions)
const tokenColumns = { tokenId, name, definition }

const { pairId, foregroundTokenId, backgroundTokenId, use } = getTableColumns(pairVersions)
const pairColumns = {
  pairId,
  foregroundTokenId,
  backgroundTokenId,
  use,
  definition: pairVersions.definition,
}

const { setId } = getTableColumns(distinctSetVersions)
const setColumns = {
  setId,
  name: distinctSetVersions.name,
  definition: distinctSetVersions.definition,
}
const earlier = alias(distinctSetVersions, 'earlier')
const setMadeAt = sql`(select min(${earlier.fromRevision}) from ${distinctSetVersions} earlier where ${earlier.systemId} = ${distinctSetVersions.systemId} and ${earlier.setId} = ${distinctSetVersions.setId})`

const TOKENS: ItemKind<GovernedToken> = { versions: tokenVersions, id: tokenId, read: readTokens }
const PAIRS: ItemKind<PairModel> = { versions: pairVersions, id: pairId, read: readPairs }
const DISTINCT_SETS: ItemKind<DistinctSet> = {
  versions: distinctSetVersions,
  id: setId,
  read: readDistinctSets,
}
