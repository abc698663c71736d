import { eq, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { rateCounters } from '#drizzle/schema/limits.ts'

/** Attempts are forgotten this long after the last one. */
const MEMORY_MINUTES = 30
const MEMORY = sql.raw(`interval ${MEMORY_MINUTES} minute`)

/** Attempts to sign in, counted in the database so that all processes share the count. */
export const createAttemptsRepository = (tx: Executor) => ({
  /** Locks the bucket; nothing counted, or all forgotten: zero. */
  lock: async (bucket: string): Promise<{ hits: number; elapsedMs: number }> => {
    const [row] = await tx
      .select({
        hits: rateCounters.hits,
        leftMs: sql<number>`timestampdiff(microsecond, utc_timestamp(3), ${rateCounters.windowEndsAt}) div 1000`,
      })
      .from(rateCounters)
      .where(eq(rateCounters.bucket, bucket))
      .for('update')
    if (row === undefined || row.leftMs <= 0) return { hits: 0, elapsedMs: 0 }
    return { hits: row.hits, elapsedMs: MEMORY_MINUTES * 60_000 - row.leftMs }
  },

  count: async (bucket: string): Promise<void> => {
    await tx
      .insert(rateCounters)
      .values({ bucket, hits: 1, windowEndsAt: sql`utc_timestamp(3) + ${MEMORY}` })
      .onDuplicateKeyUpdate({
        set: {
          hits: sql`if(${rateCounters.windowEndsAt} <= utc_timestamp(3), 1, ${rateCounters.hits} + 1)`,
          windowEndsAt: sql`utc_timestamp(3) + ${MEMORY}`,
        },
      })
  },

  /** An attempt that was right is none against its address. */
  takeBack: async (bucket: string): Promise<void> => {
    await tx
      .update(rateCounters)
      .set({ hits: sql`greatest(${rateCounters.hits}, 1) - 1` })
      .where(eq(rateCounters.bucket, bucket))
  },

  forget: async (bucket: string): Promise<void> => {
    await tx.delete(rateCounters).where(eq(rateCounters.bucket, bucket))
  },
})
