// @ts-check
import { readdirSync, readFileSync, readlinkSync } from 'node:fs'
import { setTimeout as delay } from 'node:timers/promises'

/**
 * Names one process for good: a pid is reused, a pid with its start time is not.
 * @param {number} pid
 * @returns {string | undefined} `pid-startticks`, or undefined when there is no such process (a zombie is none)
 * @see proc_pid_stat(5), fields 3 (state) and 22 (starttime)
 */
export function processIdentity(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return fields[0] === 'Z' ? undefined : `${pid}-${fields[19]}`
  } catch {
    return undefined
  }
}

/**
 * @param {number} pid
 * @returns {string[]} the arguments it was started with; empty when it is gone or another user's
 */
export function commandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean)
  } catch {
    return []
  }
}

/** @returns {number[]} */
export function listPids() {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number)
}

/**
 * @param {...string} wanted arguments that must all be there, each as a whole
 * @returns {number[]}
 */
export function findProcesses(...wanted) {
  return listPids().filter((pid) => {
    const line = commandLine(pid)
    return pid !== process.pid && wanted.every((argument) => line.includes(argument))
  })
}

/**
 * Processes that were started for another one which is gone: each carries, in a variable of its
 * environment, the identity of the process it serves.
 * @param {string} variable
 * @param {{ under?: string }} [options] only those whose working folder lies there
 * @returns {number[]}
 */
export function findOrphans(variable, { under = '/' } = {}) {
  return listPids().filter((pid) => {
    const owner = environment(pid).get(variable)
    if (owner === undefined || processIdentity(Number.parseInt(owner, 10)) === owner) return false
    return workingFolder(pid)?.startsWith(under)
  })
}

/** @param {number} pid */
function workingFolder(pid) {
  try {
    return `${readlinkSync(`/proc/${pid}/cwd`)}/`
  } catch {
    return undefined
  }
}

/**
 * @param {number} pid
 * @returns {Map<string, string>} empty when the process is gone or another user's
 */
function environment(pid) {
  try {
    const entries = readFileSync(`/proc/${pid}/environ`, 'utf8').split('\0')
    return new Map(
      entries.map((entry) => {
        const at = entry.indexOf('=')
        return [entry.slice(0, at), entry.slice(at + 1)]
      }),
    )
  } catch {
    return new Map()
  }
}

/**
 * Asks a process to end and insists when it does not.
 * @param {number} pid
 * @param {{ patienceMs?: number }} [options]
 */
export async function endProcess(pid, { patienceMs = 20_000 } = {}) {
  const identity = processIdentity(pid)
  if (identity === undefined) return
  signal(pid, 'SIGTERM')
  const deadline = Date.now() + patienceMs
  while (processIdentity(pid) === identity) {
    if (Date.now() > deadline) signal(pid, 'SIGKILL')
    await delay(20)
  }
}

/**
 * @param {number} pid
 * @param {NodeJS.Signals} name
 */
function signal(pid, name) {
  try {
    process.kill(pid, name)
  } catch (error) {
    if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'ESRCH') throw error
  }
}
