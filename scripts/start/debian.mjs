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

const LOCK_PATIENCE_SECONDS = 180
const WAITING = `Another package run holds the lock of dpkg: waiting for it, ${LOCK_PATIENCE_SECONDS} s at most.`

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
  const patience = ['-o', `DPkg::Lock::Timeout=${LOCK_PATIENCE_SECONDS}`, '-q']
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C' }
  const options = { env, onSaid: sayOnce(/Waiting for cache lock/, WAITING) }
  await runProgram('apt-get', ['update', ...patience], options)
  // Ended half-way, it leaves packages to repair by hand.
  await runProgram('apt-get', [...install.slice(1), ...patience], {
    ...options,
    patienceMs: 60_000,
  })
  const still = programs.filter((program) => findProgram(program) === undefined)
  if (still.length > 0) throw new StepFailure(`${packages.join(' ')} came without ${still.join()}`)
  return `installed ${packages.join(', ')}`
}

/**
 * @param {RegExp} pattern
 * @param {string} line shown the first time that a program says what the pattern looks for
 * @returns {(text: string) => void}
 */
function sayOnce(pattern, line) {
  let isSaid = false
  return (text) => {
    if (isSaid || !pattern.test(text)) return
    isSaid = true
    console.log(line)
  }
}
