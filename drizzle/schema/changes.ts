import {
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  text,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core'
import { idColumn, insertedAt, RESTRICT, revisionColumn, versionColumn } from './columns.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

export const changes = mysqlTable(
  'changes',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** Counts up within the system. */
    number: int('number', { unsigned: true }).notNull(),
    title: varchar('title', { length: 200 }).notNull(),
    description: text('description'),
    status: mysqlEnum('status', [
      'draft',
      'in-review',
      'approved',
      'rejected',
      'withdrawn',
      'applied',
    ]).notNull(),
    authorUserId: idColumn('author_user_id')
      .notNull()
      .references(() => users.id, RESTRICT),
    baseRevision: revisionColumn('base_revision').notNull(),
    appliedRevision: revisionColumn('applied_revision'),
    createdAt: insertedAt('created_at'),
    version: versionColumn(),
  },
  (table) => [
    unique('changes_system_id_number_uq').on(table.systemId, table.number),
    index('changes_system_id_status_idx').on(table.systemId, table.status),
  ],
)

export const changeEdits = mysqlTable(
  'change_edits',
  {
    changeId: idColumn('change_id')
      .notNull()
      .references(() => changes.id, RESTRICT),
    itemKind: mysqlEnum('item_kind', [
      'token',
      'pair',
      'theme',
      'rules',
      'distinct-set',
      'settings',
    ]).notNull(),
    itemId: idColumn('item_id').notNull(),
    operation: mysqlEnum('operation', ['add', 'edit', 'remove']).notNull(),
    /** `from_revision` of the version that was edited; with another one now, members are compared. */
    baseFromRevision: revisionColumn('base_from_revision'),
    proposal: json('proposal').$type<unknown>(),
  },
  (table) => [primaryKey({ columns: [table.changeId, table.itemKind, table.itemId] })],
)

export const changeEvents = mysqlTable(
  'change_events',
  {
    id: idColumn('id').primaryKey(),
    changeId: idColumn('change_id')
      .notNull()
      .references(() => changes.id, RESTRICT),
    kind: varchar('kind', { length: 32 }).notNull(),
    actorUserId: idColumn('actor_user_id').references(() => users.id, RESTRICT),
    body: text('body'),
    at: insertedAt('at'),
  },
  (table) => [index('change_events_change_id_idx').on(table.changeId, table.at, table.id)],
)
