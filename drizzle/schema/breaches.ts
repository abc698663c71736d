import {
  boolean,
  double,
  index,
  int,
  json,
  mysqlEnum,
  mysqlTable,
  primaryKey,
  text,
  unique,
  varchar,
} from 'drizzle-orm/mysql-core'
import { CONTRAST_KINDS, STATES, USES } from '#shared/checks/model.ts'
import { checks } from './checks.ts'
import {
  digestColumn,
  idColumn,
  insertedAt,
  instantColumn,
  RESTRICT,
  revisionColumn,
  versionColumn,
} from './columns.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'
import { waivers } from './waivers.ts'

/** The names when the breach was last written: what a deleted token or theme is still called by. */
export interface BreachNames {
  readonly foreground: string
  readonly background: string
  /** Key of the theme. */
  readonly theme: string
}

/** The pair that stands in for a breach by `anyOf`. */
export interface StandIn {
  /** Token ids. */
  readonly foreground: string
  readonly background: string
  /** What they were called then. */
  readonly names: Pick<BreachNames, 'foreground' | 'background'>
}

/** The breach log: one row an identity and origin, for ever. */
export const breaches = mysqlTable(
  'breaches',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** Counts up within the system. */
    number: int('number', { unsigned: true }).notNull(),
    /** SHA-256 of the finding's identity and the origin. */
    subjectHash: digestColumn('subject_hash').notNull(),
    /** The finding's identity as the engine spells it. */
    identity: text('identity').notNull(),
    origin: mysqlEnum('origin', ['head', 'ci']).notNull(),
    /** Empty for the head. */
    repository: varchar('repository', { length: 255 }).notNull().default(''),
    branch: varchar('branch', { length: 255 }).notNull().default(''),
    /** A candidate's token has no row but a name, escaped: these reference nothing. */
    foregroundTokenId: varchar('foreground_token_id', { length: 1024 }).notNull(),
    backgroundTokenId: varchar('background_token_id', { length: 1024 }).notNull(),
    names: json('names').$type<BreachNames>().notNull(),
    kind: mysqlEnum('kind', CONTRAST_KINDS).notNull(),
    /** As measured last; no part of the identity. */
    use: mysqlEnum('use', USES).notNull(),
    themeId: idColumn('theme_id').notNull(),
    fgState: mysqlEnum('fg_state', STATES).notNull(),
    bgState: mysqlEnum('bg_state', STATES).notNull(),
    basis: mysqlEnum('basis', ['srgb', 'p3']).notNull(),
    status: mysqlEnum('status', ['open', 'waived', 'resolved']).notNull(),
    gating: boolean('gating').notNull(),
    /** As measured last, unrounded. */
    ratio: double('ratio').notNull(),
    required: double('required').notNull(),
    lowestRatio: double('lowest_ratio').notNull(),
    /** Hexes of both layers as measured last. */
    foregroundHex: varchar('foreground_hex', { length: 9 }).notNull(),
    backgroundHex: varchar('background_hex', { length: 9 }).notNull(),
    firstSeenAt: instantColumn('first_seen_at').notNull(),
    firstSeenRevision: revisionColumn('first_seen_revision'),
    /** Null while a breach of the head lasts: every edit would rewrite every open row otherwise. */
    lastSeenAt: instantColumn('last_seen_at'),
    resolvedAt: instantColumn('resolved_at'),
    closingReason: mysqlEnum('closing_reason', [
      'fixed',
      'requirement-changed',
      'pair-removed',
      'theme-removed',
      'exempted',
      'engine-changed',
    ]),
    /** What met the requirement in its place, where that closed it. */
    metBy: json('met_by').$type<StandIn>(),
    assigneeUserId: idColumn('assignee_user_id').references(() => users.id, RESTRICT),
    waiverId: idColumn('waiver_id').references(() => waivers.id, RESTRICT),
    version: versionColumn(),
  },
  (table) => [
    unique('breaches_system_id_subject_hash_uq').on(table.systemId, table.subjectHash),
    unique('breaches_system_id_number_uq').on(table.systemId, table.number),
    index('breaches_system_id_status_idx').on(
      table.systemId,
      table.status,
      table.firstSeenAt,
      table.id,
    ),
    index('breaches_system_id_assignee_user_id_idx').on(
      table.systemId,
      table.assigneeUserId,
      table.status,
    ),
  ],
)

export const breachEvents = mysqlTable(
  'breach_events',
  {
    id: idColumn('id').primaryKey(),
    breachId: idColumn('breach_id')
      .notNull()
      .references(() => breaches.id, RESTRICT),
    kind: varchar('kind', { length: 32 }).notNull(),
    ratio: double('ratio').notNull(),
    required: double('required').notNull(),
    revision: revisionColumn('revision'),
    checkId: idColumn('check_id').references(() => checks.id, RESTRICT),
    actorUserId: idColumn('actor_user_id').references(() => users.id, RESTRICT),
    /** A comment's text. */
    body: text('body'),
    /** Whom an assignment names. */
    assigneeUserId: idColumn('assignee_user_id').references(() => users.id, RESTRICT),
    at: insertedAt('at'),
  },
  (table) => [index('breach_events_breach_id_idx').on(table.breachId, table.at, table.id)],
)

/** What pipelines saw: one row a repository, branch and identity. */
export const ciSightings = mysqlTable(
  'ci_sightings',
  {
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    repository: varchar('repository', { length: 255 }).notNull(),
    branch: varchar('branch', { length: 255 }).notNull(),
    /** SHA-256 of the finding's identity. */
    subjectHash: digestColumn('subject_hash').notNull(),
    identity: text('identity').notNull(),
    /** Whether the branch was protected when it was seen last: else the row is kept for 30 days. */
    isProtected: boolean('is_protected').notNull(),
    /** A candidate's token has no row but a name, escaped: these reference nothing. */
    foregroundTokenId: varchar('foreground_token_id', { length: 1024 }).notNull(),
    backgroundTokenId: varchar('background_token_id', { length: 1024 }).notNull(),
    names: json('names').$type<BreachNames>().notNull(),
    kind: mysqlEnum('kind', CONTRAST_KINDS).notNull(),
    use: mysqlEnum('use', USES).notNull(),
    themeId: idColumn('theme_id').notNull(),
    fgState: mysqlEnum('fg_state', STATES).notNull(),
    bgState: mysqlEnum('bg_state', STATES).notNull(),
    basis: mysqlEnum('basis', ['srgb', 'p3']).notNull(),
    gating: boolean('gating').notNull(),
    /** As measured last, unrounded. */
    ratio: double('ratio').notNull(),
    required: double('required').notNull(),
    foregroundHex: varchar('foreground_hex', { length: 9 }).notNull(),
    backgroundHex: varchar('background_hex', { length: 9 }).notNull(),
    firstSeenAt: instantColumn('first_seen_at').notNull(),
    lastSeenAt: instantColumn('last_seen_at').notNull(),
    /** Checks that saw it. */
    count: int('count', { unsigned: true }).notNull(),
    lastCommit: varchar('last_commit', { length: 64 }),
    lastCheckId: idColumn('last_check_id')
      .notNull()
      .references(() => checks.id, RESTRICT),
  },
  (table) => [
    primaryKey({
      columns: [table.systemId, table.repository, table.branch, table.subjectHash],
    }),
    index('ci_sightings_system_id_first_seen_at_idx').on(table.systemId, table.firstSeenAt),
    index('ci_sightings_is_protected_last_seen_at_idx').on(table.isProtected, table.lastSeenAt),
  ],
)
