// @ts-check
import { spawn } from 'node:child_process'
import { endProcess } from '#scripts/start/processes.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

/** @type {Map<number, number>} the patience, in ms, of each program at work */
const running = new Map()

/**
 * Runs a program to its end, quietly; what it said is shown when it fails.
 * @param {string} program
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, input?: string, patienceMs?: number, keptLines?: number,
 *   onSaid?: (text: string) => void }} [options]
 *   `patienceMs`: how long it may take to end when it is asked to; `keptLines`: how much of
 *   what it said is shown
 * @returns {Promise<string>} its standard output
 */
export function runProgram(
  program,
  args,
  {
    cwd,
    env = process.env,
    input = '',
    patienceMs = 3_000,
    keptLines = 15,
    onSaid = () => {},
  } = {},
) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd, env, stdio: 'pipe' })
    let stdout = ''
    let said = ''
    child.stdout.setEncoding('utf8').on('data', (text) => {
      stdout += text
    })
    for (const stream of [child.stdout, child.stderr]) {
      stream.setEncoding('utf8').on('data', (text) => {
        said += text
        onSaid(text)
      })
    }
    child.stdin.on('error', () => {})
    child.stdin.end(input)
    child.once('error', (error) => reject(new StepFailure(`${program}: ${error.message}`)))
    if (child.pid !== undefined) running.set(child.pid, patienceMs)
    child.once('close', (code) => {
      running.delete(/** @type {number} */ (child.pid))
      if (code === 0) return resolve(stdout)
      const tail = said.trim().split('\n').slice(-keptLines).join('\n  ')
      reject(new StepFailure(`${[program, ...args].join(' ')} failed:\n  ${tail}`, { said }))
    })
  })
}

/** Ends every program that is still at work. */
export async function endRunning() {
  await Promise.all([...running].map(([pid, patienceMs]) => endProcess(pid, { patienceMs })))
}
