import {
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  varchar,
} from 'drizzle-orm/mysql-core'
import type { RuleScope } from '#shared/checks/model.ts'
import { idColumn, RESTRICT, revisionColumn, STILL_LIVE } from './columns.ts'
import { systems } from './systems.ts'

/**
 * Rules of the whole system and of its name prefixes; those of a theme stand on the theme, those of a token
 * on the token. Each version is in force in `[from_revision, to_revision)`.
 */
export const ruleVersions = mysqlTable(
  'rule_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    scope: mysqlEnum('scope', ['system', 'prefix']).notNull(),
    /** Whole name segments; empty for the system. */
    prefix: varchar('prefix', { length: 255 }).notNull().default(''),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    /** Order in which the prefixes were given. */
    position: int('position', { unsigned: true }).notNull().default(0),
    definition: json('definition').$type<RuleScope>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.scope, table.prefix, table.fromRevision] }),
    index('rule_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
    index('rule_versions_system_id_from_revision_idx').on(table.systemId, table.fromRevision),
  ],
)
