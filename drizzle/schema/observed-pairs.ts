import { index, int, json, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'
import { digestColumn, idColumn, instantColumn, RESTRICT } from './columns.ts'
import { systems } from './systems.ts'

/** Pairs that pipelines sent with their checks: one row a system and declaration, kept while it is seen. */
export const observedPairs = mysqlTable(
  'observed_pairs',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** SHA-256 of foreground, background, backdrop, use and relation, tokens by name. */
    declarationHash: digestColumn('declaration_hash').notNull(),
    /** As it was sent last. */
    pair: json('pair').$type<PairInput>().notNull(),
    firstSeenAt: instantColumn('first_seen_at').notNull(),
    lastSeenAt: instantColumn('last_seen_at').notNull(),
    count: int('count', { unsigned: true }).notNull(),
    /** Of the last check that sent it. */
    repository: varchar('repository', { length: 255 }),
    branch: varchar('branch', { length: 255 }),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.declarationHash] }),
    index('observed_pairs_system_id_last_seen_at_idx').on(table.systemId, table.lastSeenAt),
  ],
)
