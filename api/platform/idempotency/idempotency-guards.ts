import type { PoolConnection, RowDataPacket } from 'mysql2/promise'
import type { Executor, RunTransaction } from '#api/platform/database.ts'
import { enclose } from '#api/platform/enclosing-transaction.ts'

/**
 * What makes a request that is sent many times have one effect. The races of tests/load run against this and
 * against mutants of it that leave one of them out.
 */
export interface IdempotencyGuards {
  /** Whether this connection alone holds the key now, on all processes; never waits. */
  lock(connection: PoolConnection, keyHash: string): Promise<boolean>
  unlock(connection: PoolConnection, keyHash: string): Promise<void>
  /** Runs the effect and writes its record: both are committed, or neither. */
  together<T>(
    run: RunTransaction,
    effect: () => Promise<T>,
    record: (tx: Executor, produced: T) => Promise<void>,
  ): Promise<T>
}

/** Locks are the server's, keys are the database's. A name has 64 letters at most. */
const LOCK_NAME = 'sha2(concat(database(), ?), 256)'

export const IDEMPOTENCY_GUARDS: IdempotencyGuards = {
  lock: async (connection, keyHash) => {
    const [[row]] = await connection.query<(RowDataPacket & { got: number | null })[]>(
      `select get_lock(${LOCK_NAME}, 0) as got`,
      [keyHash],
    )
    return row?.got === 1
  },
  unlock: async (connection, keyHash) => {
    try {
      await connection.query(`do release_lock(${LOCK_NAME})`, [keyHash])
    } catch {
      // What happened is known already; without its connection the lock is gone too.
      connection.destroy()
    }
  },
  together: (run, effect, record) =>
    enclose(run, async (tx) => {
      const produced = await effect()
      await record(tx, produced)
      return produced
    }),
}
