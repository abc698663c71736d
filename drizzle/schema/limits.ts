import { index, int, json, mysqlTable, smallint, varchar } from 'drizzle-orm/mysql-core'
import { digestColumn, instantColumn, verbatimColumn } from './columns.ts'

/** The answer to a request that carried an `Idempotency-Key`, for its repetitions. */
export const idempotencyRecords = mysqlTable(
  'idempotency_records',
  {
    /** SHA-256 of caller, method, route and key. */
    keyHash: digestColumn('key_hash').primaryKey(),
    requestSha256: digestColumn('request_sha256').notNull(),
    /** Null while the first request still runs. */
    status: smallint('status', { unsigned: true }),
    headers: json('headers').$type<Readonly<Record<string, string>>>(),
    body: verbatimColumn('body'),
    expiresAt: instantColumn('expires_at').notNull(),
  },
  (table) => [index('idempotency_records_expires_at_idx').on(table.expiresAt)],
)

/** Hits in a window, counted by one statement, so that all processes share one budget. */
export const rateCounters = mysqlTable(
  'rate_counters',
  {
    bucket: varchar('bucket', { length: 191 }).primaryKey(),
    hits: int('hits', { unsigned: true }).notNull(),
    windowEndsAt: instantColumn('window_ends_at').notNull(),
  },
  (table) => [index('rate_counters_window_ends_at_idx').on(table.windowEndsAt)],
)
