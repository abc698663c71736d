import { existsSync } from 'node:fs'
import { AppError } from '#api/errors.ts'

export interface HealthDependencies {
  readonly isReachable: () => Promise<boolean>
  /** While this file exists the demo is still being made. */
  readonly seedPendingFile: string | undefined
}

export type HealthService = ReturnType<typeof createHealthService>

export function createHealthService({ isReachable, seedPendingFile }: HealthDependencies) {
  let isStopping = false
  return {
    /** From now on not ready, so that no new request is sent here. */
    stop: (): void => {
      isStopping = true
    },

    /** @throws {AppError} (rejects) `service-unavailable`, saying why */
    assertReady: async (): Promise<void> => {
      if (isStopping) throw notReady('It is stopping')
      if (!(await isReachable())) throw notReady('The database does not answer')
      if (seedPendingFile !== undefined && existsSync(seedPendingFile)) {
        throw notReady('The demo is being made')
      }
    },
  }
}

const notReady = (detail: string): AppError =>
  new AppError('service-unavailable', { detail, retryAfterSeconds: 1 })
