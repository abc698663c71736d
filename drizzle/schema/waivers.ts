import { sql } from 'drizzle-orm'
import { check, double, index, mysqlEnum, mysqlTable, varchar } from 'drizzle-orm/mysql-core'
import { CONTRAST_KINDS, STATES } from '#shared/checks/model.ts'
import { idColumn, insertedAt, instantColumn, RESTRICT, versionColumn } from './columns.ts'
import { systems } from './systems.ts'
import { themes } from './themes.ts'
import { tokens } from './tokens.ts'
import { users } from './users.ts'

/** Permission to ship a breach until a date. Absent members cover all. */
export const waivers = mysqlTable(
  'waivers',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    fgTokenId: idColumn('fg_token_id')
      .notNull()
      .references(() => tokens.id, RESTRICT),
    bgTokenId: idColumn('bg_token_id')
      .notNull()
      .references(() => tokens.id, RESTRICT),
    kind: mysqlEnum('kind', CONTRAST_KINDS).notNull(),
    themeId: idColumn('theme_id').references(() => themes.id, RESTRICT),
    fgState: mysqlEnum('fg_state', STATES),
    bgState: mysqlEnum('bg_state', STATES),
    status: mysqlEnum('status', ['requested', 'granted', 'declined', 'revoked', 'ended']).notNull(),
    requestedBy: idColumn('requested_by')
      .notNull()
      .references(() => users.id, RESTRICT),
    decidedBy: idColumn('decided_by').references(() => users.id, RESTRICT),
    reason: varchar('reason', { length: 2000 }).notNull(),
    /** The least ratio it covers. */
    floorRatio: double('floor_ratio').notNull(),
    /** The requirement it was granted under; a stricter one ends it. */
    required: double('required').notNull(),
    requestedAt: insertedAt('requested_at'),
    endsAt: instantColumn('ends_at').notNull(),
    version: versionColumn(),
  },
  (table) => [
    // Nobody grants their own waiver; while undecided the comparison is unknown, which passes.
    check('waivers_decided_by_ck', sql`${table.decidedBy} <> ${table.requestedBy}`),
    index('waivers_system_id_status_idx').on(table.systemId, table.status, table.endsAt),
  ],
)
