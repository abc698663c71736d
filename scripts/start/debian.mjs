// @ts-check
import { accessSync, constants } from 'node:fs'
import { join } from 'node:path'
import { runProgram } from '#scripts/start/run-program.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

const FOLDERS = [
  ...(process.env.PATH ?? '').split(':'),
  '/usr/local/sbin',
  '/usr/sbin',
  '/sbin',
  '/usr/local/bin',
  '/usr/bin',
]

/**
 * @param {string} program
 * @returns {string | undefined} its path; daemons are found although `/usr/sbin` is not in a user's PATH
 */
export function findProgram(program) {
  return FOLDERS.filter(Boolean)
    .map((folder) => join(folder, program))
    .find((path) => {
      try {
        accessSync(path, constants.X_OK)
        return true
      } catch {
        return false
      }
    })
}

/**
 * Leaves the programs installed, or says the one line that installs them.
 * @param {{ programs: string[], packages: string[] }} wanted
 * @returns {Promise<string>} what was done, for the step's line
 */
export async function ensurePrograms({ programs, packages }) {
  if (programs.every(findProgram)) return 'present'
  const install = ['apt-get', 'install', '-y', '--no-install-recommends', ...packages]
  if (findProgram('apt-get') === undefined || process.getuid?.() !== 0) {
    const missing = programs.filter((program) => findProgram(program) === undefined)
    throw new StepFailure(
      `${missing.join(', ')} not found. Install once, then run this again:\n` +
        `  sudo apt-get update && sudo ${install.join(' ')}`,
    )
  }
  // Another package run may hold the lock for a while; apt waits for it.
  const patience = ['-o', 'DPkg::Lock::Timeout=180', '-q']
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C' }
  await runProgram('apt-get', ['update', ...patience], { env })
  // Ended half-way, it leaves packages to repair by hand.
  await runProgram('apt-get', [...install.slice(1), ...patience], { env, patienceMs: 60_000 })
  const still = programs.filter((program) => findProgram(program) === undefined)
  if (still.length > 0) throw new StepFailure(`${packages.join(' ')} came without ${still.join()}`)
  return `installed ${packages.join(', ')}`
}
