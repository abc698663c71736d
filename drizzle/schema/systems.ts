import {
  bigint,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core'
import type { SystemSettings } from '#shared/checks/model.ts'
import {
  idColumn,
  insertedAt,
  RESTRICT,
  revisionColumn,
  STILL_LIVE,
  versionColumn,
} from './columns.ts'
import { users } from './users.ts'

/** Whose breaches a check of a pipeline logs; `*` in either stands for any characters. */
export interface ProtectedBranch {
  readonly repository: string
  readonly branch: string
}

/** Name, visibility, write mode and protected branches are handling: audited, in no revision. */
export const systems = mysqlTable(
  'systems',
  {
    id: idColumn('id').primaryKey(),
    /** The slug in the address. */
    key: varchar('key', { length: 63 }).notNull(),
    name: varchar('name', { length: 120 }).notNull(),
    visibility: mysqlEnum('visibility', ['members', 'instance']).notNull().default('members'),
    writeMode: mysqlEnum('write_mode', ['direct', 'review']).notNull().default('direct'),
    protectedBranches: json('protected_branches')
      .$type<readonly ProtectedBranch[]>()
      .notNull()
      .default([]),
    createdAt: insertedAt('created_at'),
    version: versionColumn(),
  },
  (table) => [unique('systems_key_uq').on(table.key)],
)

export const memberships = mysqlTable(
  'memberships',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    userId: idColumn('user_id')
      .notNull()
      .references(() => users.id, RESTRICT),
    role: mysqlEnum('role', ['engineer', 'maintainer', 'accessibility-lead']).notNull(),
    createdAt: insertedAt('created_at'),
    version: versionColumn(),
  },
  (table) => [primaryKey({ columns: [table.systemId, table.userId] })],
)

/**
 * The row that every write of a system locks first (`FOR UPDATE`). Nothing may ever reference it: the key
 * locks of children's foreign keys would deadlock with that lock.
 */
export const systemHeads = mysqlTable('system_heads', {
  systemId: idColumn('system_id')
    .primaryKey()
    .references(() => systems.id, RESTRICT),
  revision: revisionColumn('revision').notNull().default(0),
  /** Moves with whatever changes a verdict without a revision: a waiver that starts or ends. */
  verdictEpoch: bigint('verdict_epoch', { mode: 'number', unsigned: true }).notNull().default(0),
  nextChangeNumber: int('next_change_number', { unsigned: true }).notNull().default(1),
  nextBreachNumber: int('next_breach_number', { unsigned: true }).notNull().default(1),
})

/**
 * Numbers that count up within a system outside the head's lock, such as those of checks: one statement
 * `INSERT … ON DUPLICATE KEY UPDATE last_value = LAST_INSERT_ID(last_value + 1)` takes the next one.
 */
export const systemCounters = mysqlTable(
  'system_counters',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    counter: varchar('counter', { length: 32 }).notNull(),
    lastValue: bigint('last_value', { mode: 'number', unsigned: true }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.systemId, table.counter] })],
)

/** The revisioned settings. Each version is in force in `[from_revision, to_revision)`. */
export const settingVersions = mysqlTable(
  'setting_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    definition: json('definition').$type<SystemSettings>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.fromRevision] }),
    unique('setting_versions_system_id_to_revision_uq').on(table.systemId, table.toRevision),
  ],
)
