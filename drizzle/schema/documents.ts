import { index, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core'
import { idColumn, RESTRICT, revisionColumn, STILL_LIVE, verbatimColumn } from './columns.ts'
import { systems } from './systems.ts'

/**
 * What an import brought that is not governed here (tokens of other types, groups, unknown members), kept
 * verbatim. Each version is in force in `[from_revision, to_revision)`.
 */
export const documentVersions = mysqlTable(
  'document_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** RFC 6901 pointer to where it stood. */
    pointer: varchar('pointer', { length: 512 }).notNull(),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    /** JSON text, its spelling kept. */
    content: verbatimColumn('content').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.pointer, table.fromRevision] }),
    index('document_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
  ],
)
