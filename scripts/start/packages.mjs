// @ts-check
import { createHash } from 'node:crypto'
import { existsSync, lstatSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { holdLock, LOCKS } from '#scripts/start/lock.mjs'
import { ROOT } from '#scripts/start/project.mjs'
import { runProgram } from '#scripts/start/run-program.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

const STAMP = join(ROOT, 'node_modules', '.dyewright-lock')
/** Node's major version decides which binaries a package brings. */
const MAJOR = process.versions.node.split('.')[0]
/** npm's own pauses make five minutes of a missing network. */
const RETRIES = ['--fetch-retries=2', '--fetch-retry-mintimeout=1000', '--fetch-retry-factor=4']

/**
 * Leaves `node_modules` as the lock file says. The stamp is written last, so an installation that broke off
 * is done again.
 * @param {{ serving: boolean }} options `serving`: this process holds the lock of `npm start`
 * @returns {Promise<string>} what was done, for the step's line
 */
export async function ensurePackages({ serving }) {
  if (isInstalled()) return 'present'
  const installing = await takeInstalling()
  try {
    if (isInstalled()) return 'installed by another process'
    if (!serving) await requireNoService()
    unlinkPackages()
    // NODE_ENV=production would leave out what the build needs.
    await npm(['ci', '--include=dev', '--no-audit', '--no-fund', '--prefer-offline', ...RETRIES])
    writeFileSync(STAMP, lockDigest())
    return 'installed'
  } finally {
    installing.release()
  }
}

async function takeInstalling() {
  while (true) {
    const lock = await holdLock(LOCKS.installing)
    if (lock.holder === undefined) return lock
    await delay(500)
  }
}

/** npm empties the folder that a link leads to, which is another copy's. */
function unlinkPackages() {
  const folder = join(ROOT, 'node_modules')
  if (lstatSync(folder, { throwIfNoEntry: false })?.isSymbolicLink()) rmSync(folder)
}

/** Taking packages away under a running service would break it. */
async function requireNoService() {
  const { holder, release } = await holdLock(LOCKS.serving)
  release()
  if (holder !== undefined) {
    throw new StepFailure(
      `The lock file has changed while npm start (process ${holder}) runs on the old packages. Stop it first.`,
    )
  }
}

/** @returns {boolean} */
export function isInstalled() {
  return existsSync(STAMP) && readFileSync(STAMP, 'utf8') === lockDigest()
}

/** @returns {string} */
export function lockDigest() {
  const lock = readFileSync(join(ROOT, 'package-lock.json'))
  return createHash('sha256').update(lock).update(`node ${MAJOR} ${process.arch}`).digest('hex')
}

/** @param {string[]} args */
function npm(args) {
  const script = process.env.npm_execpath
  return script?.endsWith('.js')
    ? runProgram(process.execPath, [script, ...args], { cwd: ROOT })
    : runProgram('npm', args, { cwd: ROOT })
}
