import { bigint, index, mysqlEnum, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core'
import { digestColumn, idColumn, instantColumn, RESTRICT, verbatimColumn } from './columns.ts'

/** The end of each chain; its row is the last that a write locks. */
export const auditChains = mysqlTable('audit_chains', {
  /** A system's id, or `instance`. */
  chainId: idColumn('chain_id').primaryKey(),
  lastSeq: bigint('last_seq', { mode: 'number', unsigned: true }).notNull(),
  lastHash: digestColumn('last_hash').notNull(),
})

/** Append-only: who did what. Each row's hash covers the row and the hash before it. */
export const auditEntries = mysqlTable(
  'audit_entries',
  {
    chainId: idColumn('chain_id')
      .notNull()
      .references(() => auditChains.chainId, RESTRICT),
    seq: bigint('seq', { mode: 'number', unsigned: true }).notNull(),
    at: instantColumn('at').notNull(),
    actorKind: mysqlEnum('actor_kind', ['user', 'key', 'service']).notNull(),
    /** Id of the user or key. */
    actorId: idColumn('actor_id'),
    /** For example `token.created`. */
    action: varchar('action', { length: 64 }).notNull(),
    /** Id of what it was done to. */
    subject: varchar('subject', { length: 300 }).notNull(),
    /** Canonical JSON, kept to the byte. */
    details: verbatimColumn('details').notNull(),
    previousHash: digestColumn('previous_hash').notNull(),
    hash: digestColumn('hash').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.chainId, table.seq] }),
    index('audit_entries_chain_id_at_idx').on(table.chainId, table.at),
  ],
)
