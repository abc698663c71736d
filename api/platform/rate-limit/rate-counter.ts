import type { ResultSetHeader } from 'mysql2/promise'
import type { Database } from '#api/platform/database.ts'
import { failureOf, isRetryable } from '#api/platform/database-error.ts'

/** A bucket after hits were added to it. */
export interface Counted {
  /** Hits in the present window, these among them. */
  readonly hits: number
  /** Milliseconds until the window ends, by the database's clock. */
  readonly remainingMs: number
}

/** Counts hits in windows of time, for all processes together. */
export interface RateCounter {
  /**
   * Adds hits to a bucket; the first after a window's end begin the next one.
   * @param bucket at most 191 characters
   * @param windowMs length of the window, below 10,000,000 ms
   */
  add(bucket: string, hits: number, windowMs: number): Promise<Counted>
}

const NOW = 'utc_timestamp(3)'
/** Both figures travel as the one whole number that a statement answers: below 2^53 up to 900 million hits. */
const RADIX = 10_000_000
const COUNT = `insert into rate_counters (bucket, hits, window_ends_at)
  values (?, last_insert_id(? * ${RADIX} + ?) div ${RADIX}, ${NOW} + interval ? microsecond)
  on duplicate key update
    hits = last_insert_id(if(window_ends_at > ${NOW}, hits + ?, ?) * ${RADIX}
      + if(window_ends_at > ${NOW}, timestampdiff(microsecond, ${NOW}, window_ends_at) div 1000, ?)) div ${RADIX},
    window_ends_at = if(window_ends_at > ${NOW}, window_ends_at, ${NOW} + interval ? microsecond)`

const INSERTED = 1
const PURGED_AT_ONCE = 20
const MOST_ATTEMPTS = 4

/**
 * Counts in one statement: its row stays locked from the read to the write, so no hit is lost between processes
 * and none is counted twice. Each new bucket clears away some whose window is long over.
 * @see https://mariadb.com/docs/server/reference/sql-functions/secondary-functions/information-functions/last_insert_id
 */
export const createRateCounter = ({ pool }: Pick<Database, 'pool'>): RateCounter => ({
  async add(bucket, hits, windowMs) {
    const windowUs = windowMs * 1000
    const values = [bucket, hits, windowMs, windowUs, hits, hits, windowMs, windowUs]
    const { insertId, affectedRows } = await untilCounted(async () => {
      const [result] = await pool.query<ResultSetHeader>(COUNT, values)
      return result
    })
    if (affectedRows === INSERTED) await purge(pool)
    return { hits: Math.floor(insertId / RADIX), remainingMs: insertId % RADIX }
  },
})

/** A statement that was given up as a deadlock's victim has counted nothing. */
async function untilCounted<T>(count: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await count()
    } catch (error) {
      if (attempt === MOST_ATTEMPTS || !isRetryable(error)) throw failureOf(error)
    }
  }
}

async function purge(pool: Database['pool']): Promise<void> {
  try {
    await pool.query(
      `delete from rate_counters where window_ends_at < ${NOW} - interval 1 hour
        order by window_ends_at limit ${PURGED_AT_ONCE}`,
    )
  } catch (error) {
    // Another process is at the same rows: they go with it.
    if (!isRetryable(error)) throw failureOf(error)
  }
}
