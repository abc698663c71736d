import { index, json, mysqlEnum, mysqlTable, unique, varchar } from 'drizzle-orm/mysql-core'
import { digestColumn, idColumn, insertedAt, instantColumn, RESTRICT } from './columns.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

export const apiKeys = mysqlTable(
  'api_keys',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    ownerUserId: idColumn('owner_user_id')
      .notNull()
      .references(() => users.id, RESTRICT),
    name: varchar('name', { length: 120 }).notNull(),
    kind: mysqlEnum('kind', ['read', 'ci']).notNull(),
    /** How the key begins, so that its owner can tell it from others. */
    hint: varchar('hint', { length: 24 }).notNull(),
    /** SHA-256 of the whole key, which is shown once and kept nowhere. */
    secretHash: digestColumn('secret_hash').notNull(),
    scopes: json('scopes').$type<readonly string[]>().notNull(),
    createdAt: insertedAt('created_at'),
    expiresAt: instantColumn('expires_at').notNull(),
    /** Written at most once a minute. */
    lastUsedAt: instantColumn('last_used_at'),
    revokedAt: instantColumn('revoked_at'),
  },
  (table) => [
    unique('api_keys_secret_hash_uq').on(table.secretHash),
    index('api_keys_system_id_idx').on(table.systemId, table.ownerUserId),
  ],
)
