// @ts-check
import { mkdirSync, readdirSync, rmSync, statfsSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { endServer, startMariadb } from '#scripts/start/mariadb.mjs'
import { findOrphans, processIdentity } from '#scripts/start/processes.mjs'

/** Every process of a test run carries this variable: the identity of the run. */
const RUN_VARIABLE = 'DYEWRIGHT_TEST_RUN'
const PREFIX = 'dyewright-test-'
/** 33 MB when new; the rest is room for the databases of all files and their logs. */
const ROOM_BYTES = 2 * 1024 ** 3

/**
 * Starts a server for this test run, in memory where there is room, after tidying up behind runs that
 * were killed.
 * @returns {Promise<import('#scripts/start/mariadb.mjs').Mariadb>}
 */
export async function startThrowAwayMariadb() {
  await reapLeftovers()
  const run = /** @type {string} */ (processIdentity(process.pid))
  process.env[RUN_VARIABLE] = run
  const folder = join(roomyFolder(), `${PREFIX}${run}`)
  mkdirSync(folder, { mode: 0o700 })
  const mariadb = await startMariadb({ folder: join(folder, 'data'), throwAway: true })
  return {
    ...mariadb,
    stop: async () => {
      await mariadb.stop()
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

/** Ends the processes and removes the folders of test runs that are no more, and of no others. */
export async function reapLeftovers() {
  await Promise.all(findOrphans(RUN_VARIABLE).map((pid) => endServer(pid, { patienceMs: 3_000 })))
  for (const parent of new Set(['/dev/shm', tmpdir()])) {
    for (const name of listNames(parent)) {
      const owner = name.slice(PREFIX.length)
      if (!name.startsWith(PREFIX) || processIdentity(Number.parseInt(owner, 10)) === owner)
        continue
      rmSync(join(parent, name), { recursive: true, force: true })
    }
  }
}

/** @returns {string} memory where it has room, else the temporary folder */
export function roomyFolder() {
  try {
    const { bavail, bsize } = statfsSync('/dev/shm')
    return bavail * bsize > ROOM_BYTES ? '/dev/shm' : tmpdir()
  } catch {
    return tmpdir()
  }
}

/**
 * @param {string} folder
 * @returns {string[]}
 */
function listNames(folder) {
  try {
    return readdirSync(folder)
  } catch {
    return []
  }
}
