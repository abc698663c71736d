// @ts-check
import { spawn } from 'node:child_process'
import { closeSync, mkdirSync, openSync, readFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { endProcess } from '#scripts/start/processes.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

/**
 * @typedef {object} Service the API's process
 * @property {Promise<number | null>} exited its exit code; null after a signal
 * @property {() => Promise<void>} stop lets requests in hand finish first
 * @property {(path: string, withinMs: number) => Promise<void>} untilOk waits for a 200
 */

/**
 * @param {{ script: string, cwd: string, url: string, env: NodeJS.ProcessEnv, logFile?: string }} options
 *   without a log file its output goes to ours
 * @returns {Service}
 */
export function startService({ script, cwd, url, env, logFile }) {
  const output = logFile === undefined ? 'inherit' : openLog(logFile)
  // A session of its own: Ctrl-C in the terminal reaches the parent alone, which stops things in order.
  const child = spawn(process.execPath, ['--enable-source-maps', script], {
    cwd,
    env,
    detached: true,
    stdio: ['ignore', output, output],
  })
  if (typeof output === 'number') closeSync(output)
  let ended = false
  /** @type {Promise<number | null>} */
  const exited = new Promise((resolve) => {
    child.once('exit', (code) => {
      ended = true
      resolve(code)
    })
  })
  return {
    exited,
    stop: async () => {
      if (child.pid !== undefined) await endProcess(child.pid)
      await exited
    },
    untilOk: async (path, withinMs) => {
      const deadline = Date.now() + withinMs
      while (!(await isOk(`${url}${path}`))) {
        if (ended || Date.now() > deadline) {
          const what = ended ? 'The service ended' : `No 200 from ${url}${path}`
          throw new StepFailure(`${what}.${logFile === undefined ? '' : tailOf(logFile)}`)
        }
        await delay(50)
      }
    },
  }
}

/** @param {string} url */
async function isOk(url) {
  try {
    const response = await fetch(url, { signal: AbortSignal.timeout(2_000) })
    await response.arrayBuffer()
    return response.ok
  } catch {
    return false
  }
}

/** @param {string} file */
function openLog(file) {
  mkdirSync(dirname(file), { recursive: true })
  return openSync(file, 'w')
}

/** @param {string} file */
function tailOf(file) {
  const lines = readFileSync(file, 'utf8').trim().split('\n').slice(-15)
  return ` The end of ${file}:\n  ${lines.join('\n  ')}`
}
