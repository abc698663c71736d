import { eq, sql } from 'drizzle-orm'
import type { Executor, RawResult } from '#api/platform/database.ts'
import { checks } from '#drizzle/schema/checks.ts'
import { systemCounters } from '#drizzle/schema/systems.ts'

export type CheckRow = typeof checks.$inferSelect
export type NewCheckRow = typeof checks.$inferInsert

/** Keeps checks; numbers come from a counter beside the head, so that no check waits for a write. */
export function createChecksRepository(db: Executor) {
  return {
    async takeNumber(systemId: string): Promise<number> {
      const [taken]: RawResult = await db.execute(sql`
        insert into ${systemCounters} (system_id, counter, last_value)
        values (${systemId}, 'checks', last_insert_id(1))
        on duplicate key update last_value = last_insert_id(last_value + 1)`)
      return taken.insertId
    },

    async insert(row: NewCheckRow): Promise<void> {
      await db.insert(checks).values(row)
    },

    /** In the transaction of its making: what it logged names the check, so it comes after it. */
    async setLogged(id: string, logged: CheckRow['logged']): Promise<void> {
      await db.update(checks).set({ logged }).where(eq(checks.id, id))
    },
  }
}
