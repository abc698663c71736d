import { and, desc, eq, lt, or } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { distinctSetVersions } from '#drizzle/schema/distinct-sets.ts'
import { documentVersions } from '#drizzle/schema/documents.ts'
import { pairVersions } from '#drizzle/schema/pairs.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import { ruleVersions } from '#drizzle/schema/rules.ts'
import { settingVersions } from '#drizzle/schema/systems.ts'
import { themeVersions } from '#drizzle/schema/themes.ts'
import { tokenVersions } from '#drizzle/schema/tokens.ts'
import { users } from '#drizzle/schema/users.ts'

/** Where a version begins and ends, as revision numbers; the end is not in it. */

export interface RevisionPage {
  /** Number of the last revision of the page before. */
  readonly before: number | undefined
  readonly limit: number
}

export type RevisionsReads = ReturnType<typeof createRevisionsReads>

/** Reads the revisions of a system, and the versions that each began or ended. */
export function createRevisionsReads(db: Executor) {
  return {
    list(systemId: string, { before, limit }: RevisionPage) {
      const earlier = before === undefined ? undefined : lt(revisions.number, before)
      return selectRevisions(db)
        .where(and(eq(revisions.systemId, systemId), earlier))
        .orderBy(desc(revisions.number))
        .limit(limit)
    },

    async find(systemId: string, number: number) {
      const found = and(eq(revisions.systemId, systemId), eq(revisions.number, number))
      const [row] = await selectRevisions(db).where(found)
      return row
    },

    /** Costs what the revision touched: both ends of a version are indexed. */
    async versionsTouched(systemId: string, number: number) {
      const [tokens, pairs, themes, rules, settings, distinctSets, others] = await Promise.all([
        db
          .select({ id: tokenVersions.tokenId, name: tokenVersions.name, ...spanOf(tokenVersions) })
          .from(tokenVersions)
          .where(touchedBy(tokenVersions, systemId, number)),
        db
          .select({
            id: pairVersions.pairId,
            foreground: pairVersions.foregroundTokenId,
            background: pairVersions.backgroundTokenId,
            ...spanOf(pairVersions),
          })
          .from(pairVersions)
          .where(touchedBy(pairVersions, systemId, number)),
        db
          .select({ id: themeVersions.themeId, name: themeVersions.key, ...spanOf(themeVersions) })
          .from(themeVersions)
          .where(touchedBy(themeVersions, systemId, number)),
        db
          .select({ prefix: ruleVersions.prefix, ...spanOf(ruleVersions) })
          .from(ruleVersions)
          .where(touchedBy(ruleVersions, systemId, number)),
        db
          .select(spanOf(settingVersions))
          .from(settingVersions)
          .where(touchedBy(settingVersions, systemId, number)),
        db
          .select({
            id: distinctSetVersions.setId,
            name: distinctSetVersions.name,
            ...spanOf(distinctSetVersions),
          })
          .from(distinctSetVersions)
          .where(touchedBy(distinctSetVersions, systemId, number)),
        db
          .select(spanOf(documentVersions))
          .from(documentVersions)
          .where(touchedBy(documentVersions, systemId, number)),
      ])
      return { tokens, pairs, themes, rules, settings, distinctSets, others }
    },
  }
}

export type ListedRevision = Awaited<ReturnType<RevisionsReads['list']>>[number]
const selectRevisions = (db: Executor) =>
  db
    .select({ revision: revisions, author: { id: users.id, name: users.name } })
    .from(revisions)
    .leftJoin(users, eq(users.id, revisions.authorUserId))
    .$dynamic()

type Versions =
  | typeof tokenVersions
  | typeof pairVersions
  | typeof themeVersions
  | typeof ruleVersions
  | typeof settingVersions
  | typeof distinctSetVersions
  | typeof documentVersions

const spanOf = <Table extends Versions>({ fromRevision, toRevision }: Table) => ({
  fromRevision,
  toRevision,
})

const touchedBy = (table: Versions, systemId: string, number: number) =>
  and(
    eq(table.systemId, systemId),
    or(eq(table.fromRevision, number), eq(table.toRevision, number)),
  )
