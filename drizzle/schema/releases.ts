import { index, int, mysqlTable, primaryKey, text, unique, varchar } from 'drizzle-orm/mysql-core'
import {
  bytesColumn,
  digestColumn,
  idColumn,
  insertedAt,
  RESTRICT,
  revisionColumn,
  verbatimColumn,
} from './columns.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

/** Append-only: a revision under a semantic version. */
export const releases = mysqlTable(
  'releases',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    version: varchar('version', { length: 128 }).notNull(),
    major: int('major', { unsigned: true }).notNull(),
    minor: int('minor', { unsigned: true }).notNull(),
    patch: int('patch', { unsigned: true }).notNull(),
    /** Empty for a release proper. */
    prerelease: varchar('prerelease', { length: 64 }).notNull().default(''),
    revision: revisionColumn('revision').notNull(),
    /** JSON text, kept to the byte: `sha256` is of it. */
    manifest: verbatimColumn('manifest').notNull(),
    sha256: digestColumn('sha256').notNull(),
    signature: text('signature'),
    authorUserId: idColumn('author_user_id')
      .notNull()
      .references(() => users.id, RESTRICT),
    at: insertedAt('at'),
  },
  (table) => [
    unique('releases_system_id_version_uq').on(table.systemId, table.version),
    index('releases_system_id_major_idx').on(table.systemId, table.major, table.minor, table.patch),
  ],
)

/** Append-only: the bytes of one theme in one format. */
export const releaseArtifacts = mysqlTable(
  'release_artifacts',
  {
    releaseId: idColumn('release_id')
      .notNull()
      .references(() => releases.id, RESTRICT),
    /** Key of the theme; empty for a file of the whole system. */
    theme: varchar('theme', { length: 63 }).notNull(),
    format: varchar('format', { length: 32 }).notNull(),
    sha256: digestColumn('sha256').notNull(),
    body: bytesColumn('body').notNull(),
    bodyGzip: bytesColumn('body_gzip').notNull(),
    bodyBrotli: bytesColumn('body_brotli').notNull(),
  },
  (table) => [primaryKey({ columns: [table.releaseId, table.theme, table.format] })],
)

/** Append-only: the release is no longer offered; its bytes stay. */
export const releaseWithdrawals = mysqlTable('release_withdrawals', {
  releaseId: idColumn('release_id')
    .primaryKey()
    .references(() => releases.id, RESTRICT),
  reason: varchar('reason', { length: 2000 }).notNull(),
  byUserId: idColumn('by_user_id')
    .notNull()
    .references(() => users.id, RESTRICT),
  at: insertedAt('at'),
})
