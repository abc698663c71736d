import { createAccountsRepository } from './features/accounts/accounts.repository.ts'
import { createBreachesReads } from './features/breaches/breaches.reads.ts'
import { createBreachesRepository } from './features/breaches/breaches.repository.ts'
import { createSightingsRepository } from './features/breaches/sightings.repository.ts'
import { createChecksRepository } from './features/checks/checks.repository.ts'
import { createCoverageRepository } from './features/coverage/coverage.repository.ts'
import { createJobsRepository } from './features/jobs/jobs.repository.ts'
import { createKeysRepository } from './features/keys/keys.repository.ts'
import { createMembersRepository } from './features/members/members.repository.ts'
import { createHeadsRepository } from './features/revisions/heads.repository.ts'
import { createVersionsReads } from './features/revisions/versions.reads.ts'
import { createVersionsRepository } from './features/revisions/versions.repository.ts'
import { createAttemptsRepository } from './features/sessions/attempts.repository.ts'
import { createSessionsRepository } from './features/sessions/sessions.repository.ts'
import { createSystemsRepository } from './features/systems/systems.repository.ts'
import { createAuditTrail } from './platform/audit/audit.ts'
import type { Executor, RunTransaction } from './platform/database.ts'

/** Everything that speaks SQL, over one executor: the database, or one transaction of it. */
export const createRepositories = (db: Executor) => ({
  accounts: createAccountsRepository(db),
  attempts: createAttemptsRepository(db),
  audit: createAuditTrail(db),
  breaches: { ...createBreachesReads(db), ...createBreachesRepository(db) },
  checks: createChecksRepository(db),
  coverage: createCoverageRepository(db),
  heads: createHeadsRepository(db),
  jobs: createJobsRepository(db),
  keys: createKeysRepository(db),
  members: createMembersRepository(db),
  sessions: createSessionsRepository(db),
  sightings: createSightingsRepository(db),
  systems: createSystemsRepository(db),
  versions: { ...createVersionsReads(db), ...createVersionsRepository(db) },
})

export type Repositories = ReturnType<typeof createRepositories>

/** Runs work as one transaction; the type names what it may write. */
export type Transact<K extends keyof Repositories> = <T>(
  work: (repositories: Pick<Repositories, K>) => Promise<T>,
) => Promise<T>

export const createTransactOver =
  (run: RunTransaction): Transact<keyof Repositories> =>
  (work) =>
    run((tx) => work(createRepositories(tx)))
