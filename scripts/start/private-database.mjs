// @ts-check
import { randomBytes } from 'node:crypto'
import { rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { startMariadb } from '#scripts/start/mariadb.mjs'
import { DATA } from '#scripts/start/project.mjs'

export const MARIADB_FOLDER = join(DATA, 'mariadb')
const DATABASE = 'dyewright'
const MIGRATE_USER = 'dyewright_migrate'
const SERVE_USER = 'dyewright_serve'
const HOST = '127.0.0.1'
const LONGEST_PAUSE_MS = 5_000
const URL_FILE = join(DATA, 'database-url')

/**
 * @typedef {object} Database
 * @property {string} serveUrl rows only, and nothing but SELECT and INSERT on append-only tables
 * @property {string} migrateUrl may create and alter tables
 * @property {string | undefined} grantTo the account that migrations grant the serving rights to
 * @property {() => Promise<void>} stop
 */

/**
 * Starts the database of this folder and keeps it running. The passwords are new at every start; the
 * address for serving lies in a file of this user's while it runs, for tools beside the service.
 * @param {{ afresh: boolean, log: (line: string) => void }} options `afresh` drops what an interrupted
 *   seeding left
 * @returns {Promise<Database>}
 */
export async function openPrivateDatabase({ afresh, log }) {
  const server = await startMariadb({ folder: MARIADB_FOLDER })
  const passwords = { migrate: newPassword(), serve: newPassword() }
  await server.asRoot(
    `${afresh ? `drop database if exists ${DATABASE};` : ''}${accountsSql(passwords)}`,
  )
  /** @param {string} user @param {string} password */
  const urlFor = (user, password) =>
    `mysql://${user}:${password}@${HOST}:${server.port}/${DATABASE}`
  const serveUrl = urlFor(SERVE_USER, passwords.serve)
  writeFileSync(URL_FILE, `${serveUrl}\n`, { mode: 0o600 })
  const keeper = keepRunning(server, log)
  return {
    serveUrl,
    migrateUrl: urlFor(MIGRATE_USER, passwords.migrate),
    grantTo: `${SERVE_USER}@${HOST}`,
    stop: async () => {
      rmSync(URL_FILE, { force: true })
      await keeper.stop()
    },
  }
}

/**
 * Starts the server again, on the same port, whenever it ends; the service rides it out.
 * @param {import('#scripts/start/mariadb.mjs').Mariadb} first
 * @param {(line: string) => void} log
 */
function keepRunning(first, log) {
  let server = first
  let stopping = false
  const restart = async () => {
    for (let pause = 100; !stopping; pause = Math.min(pause * 2, LONGEST_PAUSE_MS)) {
      await delay(pause)
      try {
        server = await startMariadb({ folder: MARIADB_FOLDER, port: first.port })
        return log('MariaDB is back.')
      } catch (error) {
        log(/** @type {Error} */ (error).message)
      }
    }
  }
  const watch = async () => {
    while (true) {
      await server.exited
      if (stopping) return
      log('MariaDB has ended; starting it again.')
      await restart()
      if (stopping) return server.stop()
    }
  }
  const watching = watch()
  return {
    stop: async () => {
      stopping = true
      await server.stop()
      await watching
    },
  }
}

/** @param {{ migrate: string, serve: string }} passwords */
function accountsSql(passwords) {
  const [migrate, serve] = [`${MIGRATE_USER}@'${HOST}'`, `${SERVE_USER}@'${HOST}'`]
  return `
    create database if not exists ${DATABASE} character set utf8mb4 collate utf8mb4_nopad_bin;
    create user if not exists ${migrate}, ${serve};
    alter user ${migrate} identified by '${passwords.migrate}';
    alter user ${serve} identified by '${passwords.serve}';
    grant all privileges on ${DATABASE}.* to ${migrate} with grant option;`
}

function newPassword() {
  return randomBytes(24).toString('hex')
}
