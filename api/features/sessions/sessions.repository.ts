import { and, eq, isNull, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { sessions, users } from '#drizzle/schema/users.ts'

const IDLE_MINUTES = 30
const MOST_HOURS = 12

export interface NewSession {
  readonly id: string
  readonly userId: string
  readonly tokenHash: string
}

/** Sessions start, idle and end by the database's clock. */
export const createSessionsRepository = (db: Executor) => ({
  insert: async (session: NewSession): Promise<void> => {
    await db.insert(sessions).values({
      ...session,
      expiresAt: sql`utc_timestamp(3) + interval ${sql.raw(String(MOST_HOURS))} hour`,
    })
  },

  /** Who a session in force belongs to. */
  findLive: async (tokenHash: string) => {
    const [row] = await db
      .select({
        sessionId: sessions.id,
        userId: users.id,
        name: users.name,
        email: users.email,
        isAdmin: users.isAdmin,
        isStale: sql<number>`${sessions.lastSeenAt} < utc_timestamp(3) - interval 1 minute`,
      })
      .from(sessions)
      .innerJoin(users, eq(users.id, sessions.userId))
      .where(
        and(
          eq(sessions.tokenHash, tokenHash),
          isNull(sessions.endedAt),
          isNull(users.deactivatedAt),
          sql`${sessions.expiresAt} > utc_timestamp(3)`,
          sql`${sessions.lastSeenAt} > utc_timestamp(3) - interval ${sql.raw(String(IDLE_MINUTES))} minute`,
        ),
      )
    return row
  },

  touch: async (id: string): Promise<void> => {
    await db.update(sessions).set({ lastSeenAt: sql`utc_timestamp(3)` }).where(eq(sessions.id, id))
  },

  end: async (id: string): Promise<void> => {
    await db
      .update(sessions)
      .set({ endedAt: sql`utc_timestamp(3)` })
      .where(and(eq(sessions.id, id), isNull(sessions.endedAt)))
  },
})
