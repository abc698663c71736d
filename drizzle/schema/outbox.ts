import { bigint, index, int, json, mysqlTable, unique, varchar } from 'drizzle-orm/mysql-core'
import { idColumn, insertedAt, instantColumn } from './columns.ts'

/** What is to be sent because of a write, in that write's transaction. */
export const outbox = mysqlTable(
  'outbox',
  {
    id: bigint('id', { mode: 'number', unsigned: true }).autoincrement().primaryKey(),
    /** A repeated delivery carries the same one. */
    messageId: idColumn('message_id').notNull(),
    kind: varchar('kind', { length: 64 }).notNull(),
    payload: json('payload').$type<unknown>().notNull(),
    availableAt: insertedAt('available_at'),
    attempts: int('attempts', { unsigned: true }).notNull().default(0),
    deliveredAt: instantColumn('delivered_at'),
    deadAt: instantColumn('dead_at'),
  },
  (table) => [
    unique('outbox_message_id_uq').on(table.messageId),
    index('outbox_delivered_at_idx').on(table.deliveredAt, table.deadAt, table.availableAt),
  ],
)
