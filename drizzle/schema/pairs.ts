import { index, int, json, mysqlEnum, mysqlTable, primaryKey, unique } from 'drizzle-orm/mysql-core'
import { type PairModel, USES } from '#shared/checks/model.ts'
import { digestColumn, idColumn, RESTRICT, revisionColumn, STILL_LIVE } from './columns.ts'
import { systems } from './systems.ts'
import { tokens } from './tokens.ts'

/** What a pair is at one revision, but what has a column of its own. */
export type PairDefinition = Omit<PairModel, 'id' | 'foreground' | 'background' | 'use'>

export const pairs = mysqlTable(
  'pairs',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** Counts up in the order of declaration. */
    position: int('position', { unsigned: true }).notNull(),
  },
  (table) => [unique('pairs_system_id_position_uq').on(table.systemId, table.position)],
)

/** Each version is in force in `[from_revision, to_revision)`. */
export const pairVersions = mysqlTable(
  'pair_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    pairId: idColumn('pair_id')
      .notNull()
      .references(() => pairs.id, RESTRICT),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    foregroundTokenId: idColumn('foreground_token_id')
      .notNull()
      .references(() => tokens.id, RESTRICT),
    backgroundTokenId: idColumn('background_token_id')
      .notNull()
      .references(() => tokens.id, RESTRICT),
    use: mysqlEnum('use', USES).notNull(),
    /** SHA-256 of foreground, background, backdrop, use, relation, anyOf and product. */
    declarationHash: digestColumn('declaration_hash').notNull(),
    definition: json('definition').$type<PairDefinition>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.pairId, table.fromRevision] }),
    unique('pair_versions_system_id_declaration_hash_to_revision_uq').on(
      table.systemId,
      table.declarationHash,
      table.toRevision,
    ),
    index('pair_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
    index('pair_versions_system_id_from_revision_idx').on(table.systemId, table.fromRevision),
  ],
)
