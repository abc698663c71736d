import { boolean, index, mysqlTable, unique, varchar } from 'drizzle-orm/mysql-core'
import {
  digestColumn,
  idColumn,
  insertedAt,
  instantColumn,
  RESTRICT,
  versionColumn,
} from './columns.ts'

export const users = mysqlTable(
  'users',
  {
    id: idColumn('id').primaryKey(),
    /** Lower case, NFC: what people sign in with. */
    email: varchar('email', { length: 254 }).notNull(),
    name: varchar('name', { length: 120 }).notNull(),
    /** argon2id in PHC form. */
    passwordHash: varchar('password_hash', { length: 255 }).notNull(),
    isAdmin: boolean('is_admin').notNull().default(false),
    createdAt: insertedAt('created_at'),
    deactivatedAt: instantColumn('deactivated_at'),
    version: versionColumn(),
  },
  (table) => [unique('users_email_uq').on(table.email)],
)

export const sessions = mysqlTable(
  'sessions',
  {
    id: idColumn('id').primaryKey(),
    userId: idColumn('user_id')
      .notNull()
      .references(() => users.id, RESTRICT),
    /** SHA-256 of the cookie's value, which is kept nowhere. */
    tokenHash: digestColumn('token_hash').notNull(),
    createdAt: insertedAt('created_at'),
    lastSeenAt: insertedAt('last_seen_at'),
    /** At most 12 hours after its start, however busy it is. */
    expiresAt: instantColumn('expires_at').notNull(),
    endedAt: instantColumn('ended_at'),
  },
  (table) => [
    unique('sessions_token_hash_uq').on(table.tokenHash),
    index('sessions_user_id_idx').on(table.userId),
    index('sessions_expires_at_idx').on(table.expiresAt),
  ],
)
