import { json, mysqlEnum, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core'
import type { Outcome } from '#shared/checks/model.ts'
import { changes } from './changes.ts'
import { digestColumn, idColumn, insertedAt, RESTRICT, revisionColumn } from './columns.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

/** How many findings came out how. */
export type OutcomeCounts = { readonly [outcome in Outcome]: number }

/** Append-only: a numbered state of a system. What it governs are the versions in force at its number. */
export const revisions = mysqlTable(
  'revisions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    number: revisionColumn('number').notNull(),
    origin: mysqlEnum('origin', ['created', 'direct', 'import', 'change', 'revert']).notNull(),
    authorUserId: idColumn('author_user_id').references(() => users.id, RESTRICT),
    message: varchar('message', { length: 500 }),
    changeId: idColumn('change_id').references(() => changes.id, RESTRICT),
    verdict: mysqlEnum('verdict', ['pass', 'fail']).notNull(),
    counts: json('counts').$type<OutcomeCounts>().notNull(),
    engineVersion: varchar('engine_version', { length: 32 }).notNull(),
    gamutMap: varchar('gamut_map', { length: 64 }).notNull(),
    ruleSet: varchar('rule_set', { length: 64 }).notNull(),
    /** SHA-256 of the canonical JSON of the whole state. */
    digest: digestColumn('digest').notNull(),
    at: insertedAt('at'),
  },
  (table) => [primaryKey({ columns: [table.systemId, table.number] })],
)
