import { and, eq, sql } from 'drizzle-orm'
import type { EngineStamp } from '#shared/checks/model.ts'
import type { Executor } from '#api/platform/database.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import { systemHeads, systems } from '#drizzle/schema/systems.ts'

/** Where a system's head stands: its revision, and what else moves a verdict. */
export interface HeadMark {
  readonly revision: number
  readonly epoch: number
}

/** The head's mark under its lock, with the database's time. */
export interface LockedHead extends HeadMark {
  readonly at: Date
}

const mark = { revision: systemHeads.revision, epoch: systemHeads.verdictEpoch }

/** The row that serialises the writes of a system, and the revisions that come of them. */
export function createHeadsRepository(db: Executor) {
  return {
    /** Where the head stands, or stood a moment ago. */
    async peek(systemId: string): Promise<HeadMark | undefined> {
      const [row] = await db
        .select(mark)
        .from(systemHeads)
        .where(eq(systemHeads.systemId, systemId))
      return row
    },

    /** Waits for every other write of the system; must be the first statement of a transaction. */
    async lock(systemId: string): Promise<LockedHead | undefined> {
      const at = sql`utc_timestamp(3)`.mapWith(revisions.at)
      const [row] = await db
        .select({ ...mark, at })
        .from(systemHeads)
        .where(eq(systemHeads.systemId, systemId))
        .for('update')
      return row as LockedHead | undefined
    },

    /** Takes the number of the next revision. */
    async advance(systemId: string): Promise<number> {
      const [{ insertId }] = await db
        .update(systemHeads)
        .set({ revision: sql`last_insert_id(${systemHeads.revision} + 1)` })
        .where(eq(systemHeads.systemId, systemId))
      return insertId
    },

    async begin(systemId: string): Promise<void> {
      await db.insert(systemHeads).values({ systemId })
    },

    async addRevision(row: typeof revisions.$inferInsert): Promise<void> {
      await db.insert(revisions).values(row)
    },

    /** What a revision was measured with when it was made. */
    async engineOf(systemId: string, number: number): Promise<EngineStamp | undefined> {
      const { engineVersion: version, gamutMap, ruleSet } = revisions
      const [row] = await db
        .select({ version, gamutMap, ruleSet })
        .from(revisions)
        .where(and(eq(revisions.systemId, systemId), eq(revisions.number, number)))
      return row
    },

    async writeModeOf(systemId: string): Promise<'direct' | 'review' | undefined> {
      const [row] = await db
        .select({ writeMode: systems.writeMode })
        .from(systems)
        .where(eq(systems.id, systemId))
      return row?.writeMode
    },
  }
}
export type HeadsRepository = ReturnType<typeof createHeadsRepository>
