import { and, desc, eq, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { observedPairs } from '#drizzle/schema/observed-pairs.ts'

export type ObservedPairRow = typeof observedPairs.$inferSelect
export type SeenPair = Pick<ObservedPairRow, 'declarationHash' | 'pair'>

/** The check that pairs were seen in. */
export interface SeenIn {
  readonly systemId: string
  readonly repository: string | null
  readonly branch: string | null
}

const NOW = sql`utc_timestamp(3)`
const KEPT = sql`${observedPairs.lastSeenAt} >= utc_timestamp(3) - interval 30 day`
/** Rows a statement: far below the packet limit with the widest of them. */
const CHUNK = 500

/** Pairs that pipelines sent and nobody declared, kept for 30 days after they were seen last. */
export function createCoverageRepository(db: Executor) {
  return {
    /** One statement counts, so that two checks at once are two; in the order of the key, so that they only wait. */
    async see({ systemId, ...source }: SeenIn, seen: readonly SeenPair[]): Promise<void> {
      const rows = seen
        .toSorted((a, b) => (a.declarationHash < b.declarationHash ? -1 : 1))
        .map((row) => ({
          ...row,
          ...source,
          systemId,
          firstSeenAt: NOW,
          lastSeenAt: NOW,
          count: 1,
        }))
      for (let from = 0; from < rows.length; from += CHUNK) {
        await db
          .insert(observedPairs)
          .values(rows.slice(from, from + CHUNK))
          .onDuplicateKeyUpdate({
            set: {
              pair: sql`values(${sql.identifier('pair')})`,
              count: sql`${observedPairs.count} + 1`,
              repository: sql`values(${sql.identifier('repository')})`,
              branch: sql`values(${sql.identifier('branch')})`,
              lastSeenAt: NOW,
            },
          })
      }
    },

    /** Forgets some of what was not seen for too long. */
    async sweep(systemId: string): Promise<void> {
      await db
        .delete(observedPairs)
        .where(and(eq(observedPairs.systemId, systemId), sql`not (${KEPT})`))
        .limit(CHUNK)
    },

    list(systemId: string): Promise<ObservedPairRow[]> {
      return db
        .select()
        .from(observedPairs)
        .where(and(eq(observedPairs.systemId, systemId), KEPT))
        .orderBy(desc(observedPairs.lastSeenAt), observedPairs.declarationHash)
    },
  }
}
export type CoverageRepository = ReturnType<typeof createCoverageRepository>
