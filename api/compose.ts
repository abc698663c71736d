import type { Express } from 'express'
import { createApp, type Files } from './app.ts'
import type { Config } from './config.ts'
import { WRITE_GUARDS } from './features/revisions/write-guards.ts'
import { sessionCookieFor } from './http/authenticate.ts'
import { createRateLimits } from './http/rate-limit.ts'
import { createApiRouter } from './http/route.ts'
import { systemClock } from './platform/clock.ts'
import { createDatabase } from './platform/database.ts'
import { createNewId } from './platform/ids.ts'
import { followEnclosing, joinEnclosing } from './platform/enclosing-transaction.ts'
import { IDEMPOTENCY_GUARDS } from './platform/idempotency/idempotency-guards.ts'
import { createIdempotencyStore } from './platform/idempotency/idempotency-store.ts'
import { createLogger } from './platform/logger.ts'
import { createPasswords } from './platform/passwords.ts'
import { createRateCounter } from './platform/rate-limit/rate-counter.ts'
import { createRepairLanes } from './repair-lanes.ts'
import { mountAll } from './routes.ts'
import { createServices, type Platform, type Services } from './services.ts'

export interface Composition {
  readonly config: Config
  /** What is served besides the API: the console, the gate, the document. */
  readonly files?: Files
  /** Not ready before the database has had so many. */
  readonly expectedMigrations?: number
  /** Edges of the world that are not the real ones. */
  readonly platform?: Partial<Platform>
}

export interface Service {
  readonly app: Express
  readonly services: Services
  readonly platform: Platform
  close(): Promise<void>
}

/** Puts the service together; nothing else knows how its parts meet. */
export function compose(composition: Composition): Service {
  const { config, files = {}, expectedMigrations } = composition
  const platform = createPlatform(config, composition.platform ?? {})
  const services = createServices(platform, config, expectedMigrations)
  const router = createApiRouter({
    identify: { bySession: services.sessions.identify, byKey: services.keys.identify },
    findAccess: services.members.findAccess,
    cookie: sessionCookieFor(config.publicUrl),
    publicUrl: config.publicUrl,
    idempotency: createIdempotencyStore(platform.database, platform.idempotencyGuards),
    limits: createRateLimits({
      counter: platform.rateCounter,
      logger: platform.logger,
      budgets: config.rateBudgets,
    }),
    strictAnswers: config.mode !== 'production',
  })
  mountAll(router, services)
  const app = createApp({ config, router, platform, files })
  const close = async () => {
    await platform.repairLanes.close()
    await platform.database.close()
  }
  return { app, services, platform, close }
}

function createPlatform(config: Config, given: Partial<Platform>): Platform {
  const database =
    given.database ??
    createDatabase({ url: config.databaseUrl, connections: config.databaseConnections })
  const transact = given.transact ?? database.transact
  return {
    clock: systemClock,
    newId: createNewId(),
    logger: given.logger ?? createLogger({ level: config.logLevel }),
    passwords: given.passwords ?? createPasswords(config.passwordCost),
    writeGuards: WRITE_GUARDS,
    idempotencyGuards: IDEMPOTENCY_GUARDS,
    rateCounter: createRateCounter(database),
    repairLanes: createRepairLanes(),
    ...given,
    transact: joinEnclosing(transact),
    database: { ...database, db: followEnclosing(database.db) },
  }
}
