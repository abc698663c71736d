import { existsSync } from 'node:fs'
import { AppError } from '#api/errors.ts'

export interface HealthDependencies {
  /** How many migrations the database has had; rejects while it is away or has had none. */
  readonly countMigrations: () => Promise<number>
  /** How many this build expects; absent where nobody has said. */
  readonly expectedMigrations: number | undefined
  /** While this file exists the demo is still being made. */
  readonly seedPendingFile: string | undefined
}

export type HealthService = ReturnType<typeof createHealthService>

export function createHealthService({
  countMigrations,
  expectedMigrations = 0,
  seedPendingFile,
}: HealthDependencies) {
  let isStopping = false
  return {
    /** From now on not ready, so that no new request is sent here. */
    stop: (): void => {
      isStopping = true
    },

    /** @throws {AppError} (rejects) `service-unavailable`, saying why */
    assertReady: async (): Promise<void> => {
      if (isStopping) throw notReady('It is stopping')
      const migrations = await countMigrations().catch(() => undefined)
      if (migrations === undefined) throw notReady('The database does not answer')
      if (migrations < expectedMigrations) throw notReady('The database is being migrated')
      if (seedPendingFile !== undefined && existsSync(seedPendingFile)) {
        throw notReady('The demo is being made')
      }
    },
  }
}

const notReady = (detail: string): AppError =>
  new AppError('service-unavailable', { detail, retryAfterSeconds: 1 })
