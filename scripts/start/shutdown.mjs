// @ts-check
import { endRunning } from '#scripts/start/run-program.mjs'
import { describeFailure } from '#scripts/start/steps.mjs'

/** @type {(() => unknown)[]} */
const closers = []
let stopping = false

/**
 * What is opened last is closed first.
 * @param {() => unknown} close
 */
export function onStop(close) {
  closers.push(close)
}

export function isStopping() {
  return stopping
}

/**
 * Stops everything in order and ends the process.
 * @param {number} exitCode
 * @returns {Promise<never>}
 */
export async function stopAll(exitCode) {
  if (stopping) return new Promise(() => {})
  stopping = true
  await endRunning()
  for (const close of closers.reverse()) {
    try {
      await close()
    } catch (error) {
      console.error(error)
    }
  }
  process.exit(exitCode)
}

/** Ctrl-C, a service manager's SIGTERM and a closed terminal all stop it cleanly. */
export function stopOnSignals() {
  for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(name, () => {
      if (!stopping) console.log('\nStopping.')
      void stopAll(0)
    })
  }
}

/**
 * @param {() => Promise<void>} work
 */
export async function runOrStop(work) {
  try {
    await work()
  } catch (error) {
    // A program that was ended because we stop has nothing to complain about.
    if (stopping) return
    console.error(`\n${describeFailure(error)}`)
    await stopAll(1)
  }
}
