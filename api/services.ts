import type { Config } from './config.ts'
import { createAccountsService } from './features/accounts/accounts.service.ts'
import { createHealthService } from './features/health/health.service.ts'
import { createJobsService } from './features/jobs/jobs.service.ts'
import { createKeysService } from './features/keys/keys.service.ts'
import { createMembersService } from './features/members/members.service.ts'
import { createSessionsService } from './features/sessions/sessions.service.ts'
import type { WriteGuards } from './features/revisions/write-guards.ts'
import { createGovernedServices } from './governed-services.ts'
import { problemOf } from './http/problem.ts'
import type { Clock } from './platform/clock.ts'
import type { Database, RunTransaction } from './platform/database.ts'
import { enclose } from './platform/enclosing-transaction.ts'
import type { IdempotencyGuards } from './platform/idempotency/idempotency-guards.ts'
import type { NewId } from './platform/ids.ts'
import type { Logger } from './platform/logger.ts'
import type { RateCounter } from './platform/rate-limit/rate-counter.ts'
import type { Passwords } from './platform/passwords.ts'
import type { RepairLanes } from './repair-lanes.ts'
import { createRepositories, createTransactOver } from './repositories.ts'

/** The outside world, as services reach it. */
export interface Platform {
  readonly clock: Clock
  readonly newId: NewId
  readonly logger: Logger
  readonly database: Database
  readonly passwords: Passwords
  /** The database's own, unless a test breaks it on purpose. */
  readonly transact: RunTransaction
  /** The head's lock and comparisons, unless a test leaves one out on purpose. */
  readonly writeGuards: WriteGuards
  /** The lock and the common transaction of an Idempotency-Key, unless a test leaves one out on purpose. */
  readonly idempotencyGuards: IdempotencyGuards
  /** The database's own counter, unless a test counts otherwise on purpose. */
  readonly rateCounter: RateCounter
  readonly repairLanes: RepairLanes
}

/** Wires every use case to the world. */
export function createServices(platform: Platform, config: Config, expectedMigrations?: number) {
  const { newId, database, passwords, logger } = platform
  const reads = createRepositories(database.db)
  const transact = createTransactOver(platform.transact)
  const members = createMembersService({ transact, reads })
  const { findAccess } = members
  const jobs = createJobsService({
    transact,
    reads,
    enclosed: (work) => enclose(platform.transact, (tx) => work(createRepositories(tx))),
    newId,
    logger,
    problemOf,
  })
  return {
    ...createGovernedServices(platform, { reads, transact, findAccess, jobs }),
    accounts: createAccountsService({ transact, reads, newId, passwords }),
    sessions: createSessionsService({ transact, reads, newId, passwords }),
    keys: createKeysService({ transact, reads, newId }),
    members,
    jobs,
    health: createHealthService({
      countMigrations: database.countMigrations,
      expectedMigrations,
      seedPendingFile: config.seedPendingFile,
    }),
  }
}

export type Services = ReturnType<typeof createServices>
