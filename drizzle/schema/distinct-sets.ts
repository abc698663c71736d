import { index, json, mysqlTable, primaryKey, unique, varchar } from 'drizzle-orm/mysql-core'
import { idColumn, RESTRICT, revisionColumn, STILL_LIVE } from './columns.ts'
import { systems } from './systems.ts'

export interface DistinctSetDefinition {
  /** Ids of tokens that must stay tellable apart. */
  readonly tokens: readonly string[]
}

export const distinctSets = mysqlTable('distinct_sets', {
  id: idColumn('id').primaryKey(),
  systemId: idColumn('system_id')
    .notNull()
    .references(() => systems.id, RESTRICT),
})

/** Each version is in force in `[from_revision, to_revision)`. */
export const distinctSetVersions = mysqlTable(
  'distinct_set_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    setId: idColumn('set_id')
      .notNull()
      .references(() => distinctSets.id, RESTRICT),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    name: varchar('name', { length: 120 }).notNull(),
    definition: json('definition').$type<DistinctSetDefinition>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.setId, table.fromRevision] }),
    unique('distinct_set_versions_system_id_name_to_revision_uq').on(
      table.systemId,
      table.name,
      table.toRevision,
    ),
    index('distinct_set_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
  ],
)
