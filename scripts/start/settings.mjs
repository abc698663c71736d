// @ts-check
import { StepFailure } from '#scripts/start/steps.mjs'

/**
 * @typedef {object} Settings what `npm start` itself needs to know; the rest is the service's own (api/config.ts)
 * @property {string} host
 * @property {number} port
 * @property {string} url where the service answers this machine
 * @property {boolean} production
 * @property {string | undefined} databaseUrl without one, a private database is run
 * @property {string | undefined} migrateDatabaseUrl
 */

/**
 * @param {NodeJS.ProcessEnv} env
 * @returns {Settings}
 */
export function readSettings(env) {
  const port = Number(env.PORT || 4310)
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new StepFailure(`PORT is a number from 1 to 65535, not ${env.PORT}.`)
  }
  const host = env.HOST || '127.0.0.1'
  const everywhere = host === '0.0.0.0' || host === '::'
  const shownHost = everywhere ? '127.0.0.1' : host.includes(':') ? `[${host}]` : host
  return {
    host,
    port,
    url: `http://${shownHost}:${port}`,
    production: env.NODE_ENV === 'production',
    databaseUrl: env.DATABASE_URL || undefined,
    migrateDatabaseUrl: env.MIGRATE_DATABASE_URL || undefined,
  }
}
