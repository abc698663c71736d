import { index, json, mysqlEnum, mysqlTable, varchar } from 'drizzle-orm/mysql-core'
import { idColumn, insertedAt, instantColumn, RESTRICT, verbatimColumn } from './columns.ts'
import { apiKeys } from './keys.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

/** How far a job is, in tokens; a search also says how many evaluations it has made, of how many. */
export interface JobProgress {
  readonly total: number
  readonly read: number
  readonly resolved: number
  readonly measured: number
  readonly evaluations?: number
  readonly budget?: number
}

/** Why a job ended without a result: a refusal as it would have been answered. */
export interface JobFailure {
  readonly code: string
  readonly detail?: string
  readonly faults?: readonly unknown[]
  readonly extra?: Readonly<Record<string, unknown>>
}

/** Work that outlasts the request that asked for it. Any process may tell how far it is. */
export const jobs = mysqlTable(
  'jobs',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    kind: mysqlEnum('kind', ['import', 'repair-plan', 'check', 'nearest-passing']).notNull(),
    callerUserId: idColumn('caller_user_id').references(() => users.id, RESTRICT),
    callerKeyId: idColumn('caller_key_id').references(() => apiKeys.id, RESTRICT),
    /** Of the request that asked for it: finds its line in the log. */
    requestId: varchar('request_id', { length: 64 }).notNull(),
    state: mysqlEnum('state', ['running', 'done', 'failed']).notNull().default('running'),
    progress: json('progress').$type<JobProgress>().notNull(),
    /** JSON text of what would have been answered at once. */
    result: verbatimColumn('result'),
    failure: json('failure').$type<JobFailure>(),
    /** While it runs its process moves this on; once it is past, that process is gone and nothing was done. */
    leaseEndsAt: instantColumn('lease_ends_at').notNull(),
    createdAt: insertedAt('created_at'),
    finishedAt: instantColumn('finished_at'),
  },
  (table) => [
    index('jobs_system_id_created_at_idx').on(table.systemId, table.createdAt),
    index('jobs_created_at_idx').on(table.createdAt),
  ],
)
