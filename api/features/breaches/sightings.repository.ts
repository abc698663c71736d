import { and, asc, eq, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { ciSightings } from '#drizzle/schema/breaches.ts'
import { systems } from '#drizzle/schema/systems.ts'
import { createSightingsReads, LAPSED } from './sightings.reads.ts'

export type NewSightingRow = Omit<
  typeof ciSightings.$inferInsert,
  'firstSeenAt' | 'lastSeenAt' | 'count'
>
type Branch = Pick<typeof ciSightings.$inferSelect, 'systemId' | 'repository' | 'branch'>

export type SightingsRepository = ReturnType<typeof createSightingsRepository>

/** Rows a statement. */
const CHUNK = 500
/** Of other branches, at most, with each check. */
const SWEPT_ROWS = 500

/** Writes what pipelines saw, by the database's clock. */
export const createSightingsRepository = (db: Executor) => ({
  ...createSightingsReads(db),

  protectedBranches: async (systemId: string) => {
    const [row] = await db
      .select({ patterns: systems.protectedBranches })
      .from(systems)
      .where(eq(systems.id, systemId))
    return row?.patterns ?? []
  },

  /** Removes what has lapsed: all of this branch, so that it counts from one again, and some of others. */
  sweep: async ({ systemId, repository, branch }: Branch): Promise<void> => {
    const ofBranch = and(
      eq(ciSightings.systemId, systemId),
      eq(ciSightings.repository, repository),
      eq(ciSightings.branch, branch),
    )
    await db.delete(ciSightings).where(and(ofBranch, LAPSED))
    await db
      .delete(ciSightings)
      .where(LAPSED)
      .orderBy(asc(ciSightings.lastSeenAt))
      .limit(SWEPT_ROWS)
  },

  /** One statement counts, so that two checks at once are two. */
  see: async (rows: readonly NewSightingRow[]): Promise<void> => {
    for (let from = 0; from < rows.length; from += CHUNK) {
      await db
        .insert(ciSightings)
        .values(
          rows.slice(from, from + CHUNK).map((row) => ({
            ...row,
            firstSeenAt: NOW,
            lastSeenAt: NOW,
            count: 1,
          })),
        )
        .onDuplicateKeyUpdate({ set: SEEN_AGAIN })
    }
  },
})

const NOW = sql`utc_timestamp(3)`

const incoming = (column: { readonly name: string }) => sql`values(${sql.identifier(column.name)})`

const SEEN_AGAIN = {
  ...Object.fromEntries(
    (
      [
        'names',
        'use',
        'isProtected',
        'basis',
        'gating',
        'ratio',
        'required',
        'foregroundHex',
        'backgroundHex',
        'lastSeenAt',
        'lastCommit',
        'lastCheckId',
      ] as const
    ).map((name) => [name, incoming(ciSightings[name])]),
  ),
  count: sql`${sql.identifier(ciSightings.count.name)} + 1`,
}
