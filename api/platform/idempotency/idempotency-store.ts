import { and, eq, gt, lte, sql } from 'drizzle-orm'
import { drizzle } from 'drizzle-orm/mysql2'
import type { PoolConnection } from 'mysql2/promise'
import { createTransact, type Database, type Executor } from '#api/platform/database.ts'
import { isDuplicate, isRetryable } from '#api/platform/database-error.ts'
import { idempotencyRecords } from '#drizzle/schema/limits.ts'
import { packAnswer, unpackAnswer } from './answer-packing.ts'
import { IDEMPOTENCY_GUARDS, type IdempotencyGuards } from './idempotency-guards.ts'

/** An answer as it is kept for its repetitions. */
export interface KeptAnswer {
  readonly status: number
  readonly headers: Readonly<Record<string, string>>
  /** Empty where the answer has none. */
  readonly body: string
}

export interface IdempotencyRecord extends KeptAnswer {
  readonly requestSha256: string
}

export type Once<T> =
  | { readonly state: 'done'; readonly value: T }
  | { readonly state: 'recorded'; readonly record: IdempotencyRecord }
  | { readonly state: 'running' }

export interface IdempotencyStore {
  /**
   * Runs the effect unless it ran already, and keeps its answer in the same transaction. One connection in all.
   * @param keyHash SHA-256 that names caller, method, route and key
   * @returns `running` where another request of the same key is at it; rejects with what the effect threw, which
   *   then left neither trace nor record
   */
  once<T>(
    keyHash: string,
    effect: () => Promise<{ value: T; record: IdempotencyRecord }>,
  ): Promise<Once<T>>
}

const KEPT_HOURS = 24
const PURGED_AT_ONCE = 20

export const createIdempotencyStore = (
  { db, pool }: Pick<Database, 'db' | 'pool'>,
  guards: IdempotencyGuards = IDEMPOTENCY_GUARDS,
): IdempotencyStore => ({
  async once(keyHash, effect) {
    const record = await findLive(db, keyHash)
    if (record !== undefined) return { state: 'recorded', record }
    return onConnection(pool, async (connection) => {
      if (!(await guards.lock(connection, keyHash))) return { state: 'running' }
      try {
        return await runUnderLock(drizzle({ client: connection }), { guards, keyHash, effect })
      } finally {
        await guards.unlock(connection, keyHash)
      }
    })
  },
})

/** The lock and the transaction share the connection: they live and die together. */
async function onConnection<T>(
  pool: Database['pool'],
  work: (connection: PoolConnection) => Promise<T>,
): Promise<T> {
  const connection = await pool.getConnection()
  try {
    return await work(connection)
  } finally {
    connection.release()
  }
}

interface Turn<T> {
  readonly guards: IdempotencyGuards
  readonly keyHash: string
  readonly effect: () => Promise<{ value: T; record: IdempotencyRecord }>
}

async function runUnderLock<T>(
  db: Executor,
  { guards, keyHash, effect }: Turn<T>,
): Promise<Once<T>> {
  const record = await findLive(db, keyHash)
  if (record !== undefined) return { state: 'recorded', record }
  await purge(db)
  try {
    const done = await guards.together(createTransact(db), effect, (tx, produced) =>
      insert(tx, keyHash, produced.record),
    )
    return { state: 'done', value: done.value }
  } catch (error) {
    if (isDuplicate(error, 'PRIMARY') && (await findLive(db, keyHash))) return { state: 'running' }
    throw error
  }
}

async function findLive(db: Executor, keyHash: string): Promise<IdempotencyRecord | undefined> {
  const { requestSha256, status, headers, body, expiresAt } = idempotencyRecords
  const [row] = await db
    .select({ requestSha256, status, headers, body })
    .from(idempotencyRecords)
    .where(and(eq(idempotencyRecords.keyHash, keyHash), gt(expiresAt, sql`utc_timestamp(3)`)))
  if (row === undefined || row.status === null) return undefined
  const kept = { status: row.status, headers: row.headers ?? {}, body: row.body ?? '' }
  return { ...(await unpackAnswer(kept)), requestSha256: row.requestSha256 }
}

async function insert(tx: Executor, keyHash: string, record: IdempotencyRecord): Promise<void> {
  const isSame = eq(idempotencyRecords.keyHash, keyHash)
  const isOver = lte(idempotencyRecords.expiresAt, sql`utc_timestamp(3)`)
  await tx.delete(idempotencyRecords).where(and(isSame, isOver))
  await tx.insert(idempotencyRecords).values({
    keyHash,
    requestSha256: record.requestSha256,
    ...(await packAnswer(record)),
    expiresAt: sql`utc_timestamp(3) + interval ${KEPT_HOURS} hour`,
  })
}

/** Each use clears away some that are over, so the table stays as small as a day's keys. */
async function purge(db: Executor): Promise<void> {
  const { expiresAt } = idempotencyRecords
  try {
    await db
      .delete(idempotencyRecords)
      .where(lte(expiresAt, sql`utc_timestamp(3)`))
      .orderBy(expiresAt)
      .limit(PURGED_AT_ONCE)
  } catch (error) {
    // Another process is at the same rows: they go with it.
    if (!isRetryable(error)) throw error
  }
}
