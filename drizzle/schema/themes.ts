import {
  boolean,
  index,
  int,
  json,
  mysqlTable,
  primaryKey,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core'
import type { ThemeModel } from '#shared/checks/model.ts'
import { idColumn, RESTRICT, revisionColumn, STILL_LIVE } from './columns.ts'
import { systems } from './systems.ts'

/** What a theme is at one revision, but what has a column of its own. Its values stand on the tokens. */
export interface ThemeDefinition extends Omit<ThemeModel, 'id' | 'key' | 'gating'> {
  readonly name: string
}

export const themes = mysqlTable('themes', {
  id: idColumn('id').primaryKey(),
  systemId: idColumn('system_id')
    .notNull()
    .references(() => systems.id, RESTRICT),
})

/** Each version is in force in `[from_revision, to_revision)`. */
export const themeVersions = mysqlTable(
  'theme_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    themeId: idColumn('theme_id')
      .notNull()
      .references(() => themes.id, RESTRICT),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    key: varchar('key', { length: 63 }).notNull(),
    /** 0 is the base. */
    position: int('position', { unsigned: true }).notNull(),
    gating: boolean('gating').notNull(),
    definition: json('definition').$type<ThemeDefinition>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.themeId, table.fromRevision] }),
    unique('theme_versions_system_id_key_to_revision_uq').on(
      table.systemId,
      table.key,
      table.toRevision,
    ),
    index('theme_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
    index('theme_versions_system_id_from_revision_idx').on(table.systemId, table.fromRevision),
  ],
)
