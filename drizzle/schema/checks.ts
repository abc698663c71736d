import { index, int, json, mysqlEnum, mysqlTable, unique, varchar } from 'drizzle-orm/mysql-core'
import { bytesColumn, idColumn, insertedAt, RESTRICT, revisionColumn } from './columns.ts'
import { apiKeys } from './keys.ts'
import { releases } from './releases.ts'
import type { OutcomeCounts } from './revisions.ts'
import { systems } from './systems.ts'
import { users } from './users.ts'

/** What a check of a pipeline left in the log. */
export interface LoggedSightings {
  /** Whether its branch was protected, so that breaches were opened and resolved. */
  readonly protected: boolean
  /** Findings that fell short, also those that newOnly lets pass. */
  readonly seen: number
  readonly opened: number
  readonly resolved: number
}

/** One evaluation that was asked for: counts, and the findings that are not `pass`. */
export const checks = mysqlTable(
  'checks',
  {
    id: idColumn('id').primaryKey(),
    systemId: idColumn('system_id')
      .notNull()
      .references(() => systems.id, RESTRICT),
    /** Counts up within the system. */
    number: int('number', { unsigned: true }).notNull(),
    againstRevision: revisionColumn('against_revision').notNull(),
    releaseId: idColumn('release_id').references(() => releases.id, RESTRICT),
    callerUserId: idColumn('caller_user_id').references(() => users.id, RESTRICT),
    callerKeyId: idColumn('caller_key_id').references(() => apiKeys.id, RESTRICT),
    repository: varchar('repository', { length: 255 }),
    branch: varchar('branch', { length: 255 }),
    commitSha: varchar('commit_sha', { length: 64 }),
    pipelineUrl: varchar('pipeline_url', { length: 2000 }),
    verdict: mysqlEnum('verdict', ['pass', 'fail']).notNull(),
    counts: json('counts').$type<OutcomeCounts>().notNull(),
    engineVersion: varchar('engine_version', { length: 32 }).notNull(),
    gamutMap: varchar('gamut_map', { length: 64 }).notNull(),
    ruleSet: varchar('rule_set', { length: 64 }).notNull(),
    /** Gzipped JSON: findings that are not `pass`, and advisories, as they were answered. */
    findingsGzip: bytesColumn('findings_gzip').notNull(),
    /** Null where no repository and branch were named. */
    logged: json('logged').$type<LoggedSightings>(),
    at: insertedAt('at'),
  },
  (table) => [
    unique('checks_system_id_number_uq').on(table.systemId, table.number),
    index('checks_system_id_verdict_idx').on(table.systemId, table.verdict, table.number),
    index('checks_caller_key_id_idx').on(table.callerKeyId, table.number),
  ],
)
