import { index, int, json, mysqlTable, primaryKey, unique, varchar } from 'drizzle-orm/mysql-core'
import type { TokenModel } from '#shared/checks/model.ts'
import { idColumn, RESTRICT, revisionColumn, STILL_LIVE } from './columns.ts'
import { systems } from './systems.ts'

/** What a token is at one revision, but its name. */
export interface TokenDefinition extends Omit<TokenModel, 'id' | 'name'> {
  readonly description?: string
  readonly locked: boolean
  readonly deprecated?: {
    readonly reason?: string
    /** Id of the token to take instead. */
    readonly replacement?: string
    readonly sunset?: string
  }
}

export const tokens = mysqlTable(
  'tokens',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** Place in the ledger: counts up in the order of making. */
    position: int('position', { unsigned: true }).notNull(),
  },
  (table) => [unique('tokens_system_id_position_uq').on(table.systemId, table.position)],
)

/** Each version is in force in `[from_revision, to_revision)`. */
export const tokenVersions = mysqlTable(
  'token_versions',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    tokenId: idColumn('token_id')
      .notNull()
      .references(() => tokens.id, RESTRICT),
    fromRevision: revisionColumn('from_revision').notNull(),
    toRevision: revisionColumn('to_revision').notNull().default(STILL_LIVE),
    name: varchar('name', { length: 255 }).notNull(),
    definition: json('definition').$type<TokenDefinition>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.systemId, table.tokenId, table.fromRevision] }),
    unique('token_versions_system_id_name_to_revision_uq').on(
      table.systemId,
      table.name,
      table.toRevision,
    ),
    index('token_versions_system_id_to_revision_idx').on(
      table.systemId,
      table.toRevision,
      table.fromRevision,
    ),
    index('token_versions_system_id_from_revision_idx').on(table.systemId, table.fromRevision),
  ],
)
