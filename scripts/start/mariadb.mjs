// @ts-check
import { spawn } from 'node:child_process'
import {
  closeSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  openSync,
  readFileSync,
  renameSync,
  rmSync,
} from 'node:fs'
import { tmpdir, userInfo } from 'node:os'
import { basename, dirname, join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { ensurePrograms, findProgram } from '#scripts/start/debian.mjs'
import { freePort } from '#scripts/start/free-port.mjs'
import { commandLine, endProcess, findProcesses } from '#scripts/start/processes.mjs'
import { runProgram } from '#scripts/start/run-program.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

/**
 * @typedef {object} Mariadb a private server, listening on 127.0.0.1 and on a socket of its own
 * @property {number} port
 * @property {number} pid
 * @property {(sql: string) => Promise<string>} asRoot runs statements over the socket, the only way in for its root
 * @property {Promise<void>} exited
 * @property {() => Promise<void>} stop
 */

const SOCKET_FLAG = '--socket='
const SOCKET_FOLDER = 'dyw-'
const READY_WITHIN_MS = 30_000
/** sun_path holds 108 bytes, one of them the closing zero. */
const SOCKET_PATH_LIMIT = 107
const AS_ROOT = process.getuid?.() === 0 ? ['--user=root'] : []
/** Rows of a throw-away server need not survive a power cut; a real one keeps the durable defaults. */
const THROW_AWAY = [
  '--innodb-flush-log-at-trx-commit=0',
  '--innodb-doublewrite=0',
  '--innodb-log-file-size=16M',
  '--performance-schema=0',
]
const DURABLE = ['--innodb-flush-log-at-trx-commit=1']

/** @returns {Promise<string>} what was done, for the step's line */
export function ensureMariadb() {
  return ensurePrograms({
    programs: ['mariadbd', 'mariadb-install-db', 'mariadb'],
    packages: ['mariadb-server-core', 'mariadb-client-core'],
  })
}

/**
 * Starts a server on the data folder, creating the folder when it is missing. A server that an earlier run
 * left behind on the same folder is ended first.
 * @param {{ folder: string, port?: number, throwAway?: boolean }} options `folder` absolute; without `port` a free one
 * @returns {Promise<Mariadb>}
 */
export async function startMariadb({ folder, port, throwAway = false }) {
  await endMariadb(folder)
  await createDataFolder(folder)
  const socketFolder = mkdtempSync(join(shortTemporaryFolder(), SOCKET_FOLDER))
  const socket = join(socketFolder, 's')
  const log = `${folder}.log`
  const chosenPort = port ?? (await freePort())
  const output = openSync(log, 'w')
  // A session of its own: Ctrl-C in the terminal reaches the parent alone, which stops things in order.
  const child = spawn(
    program('mariadbd'),
    [
      '--no-defaults',
      ...AS_ROOT,
      `--datadir=${folder}`,
      `${SOCKET_FLAG}${socket}`,
      `--pid-file=${join(socketFolder, 'pid')}`,
      `--port=${chosenPort}`,
      '--bind-address=127.0.0.1',
      '--skip-networking=off',
      '--skip-name-resolve',
      '--character-set-server=utf8mb4',
      '--collation-server=utf8mb4_nopad_bin',
      '--default-time-zone=+00:00',
      ...(throwAway ? THROW_AWAY : DURABLE),
    ],
    { detached: true, stdio: ['ignore', output, output] },
  )
  closeSync(output)
  let running = true
  /** @type {Promise<void>} */
  const exited = new Promise((resolve) => {
    child.once('exit', () => {
      running = false
      rmSync(socketFolder, { recursive: true, force: true })
      resolve()
    })
  })
  const pid = /** @type {number} */ (child.pid)
  await untilReady({ socket, isRunning: () => running, log }).catch(async (error) => {
    await endProcess(pid)
    throw error
  })
  return {
    port: chosenPort,
    pid,
    exited,
    asRoot: (sql) => runAsRoot(socket, sql),
    stop: async () => {
      await endProcess(pid)
      await exited
    },
  }
}

/**
 * Ends whatever server runs on the data folder, however it was started.
 * @param {string} folder absolute
 */
export async function endMariadb(folder) {
  for (const pid of findProcesses(`--datadir=${folder}`)) await endServer(pid)
}

/**
 * Ends a process and, where it is a server of ours, removes the folder of its socket.
 * @param {number} pid
 * @param {{ patienceMs?: number }} [options]
 */
export async function endServer(pid, options) {
  const socket = commandLine(pid).find((argument) => argument.startsWith(SOCKET_FLAG))
  await endProcess(pid, options)
  if (socket === undefined) return
  const socketFolder = dirname(socket.slice(SOCKET_FLAG.length))
  if (basename(socketFolder).startsWith(SOCKET_FOLDER)) {
    rmSync(socketFolder, { recursive: true, force: true })
  }
}

/**
 * Root comes in over the socket alone, proved by the operating system's user: it has no password to lose.
 * @param {string} folder
 */
async function createDataFolder(folder) {
  if (existsSync(folder)) return
  const unfinished = `${folder}.tmp`
  rmSync(unfinished, { recursive: true, force: true })
  mkdirSync(dirname(folder), { recursive: true })
  await runProgram(program('mariadb-install-db'), [
    '--no-defaults',
    '--auth-root-authentication-method=socket',
    `--auth-root-socket-user=${userInfo().username}`,
    '--skip-test-db',
    // A machine whose own name does not resolve is no hindrance: nobody comes in by a host's name.
    '--force',
    ...AS_ROOT,
    `--datadir=${unfinished}`,
  ])
  renameSync(unfinished, folder)
}

/** @param {{ socket: string, isRunning: () => boolean, log: string }} server */
async function untilReady({ socket, isRunning, log }) {
  const deadline = Date.now() + READY_WITHIN_MS
  while (isRunning() && Date.now() < deadline) {
    await delay(50)
    if (existsSync(socket) && (await answers(socket))) return
  }
  const said = readFileSync(log, 'utf8').trim()
  const tail = said.split('\n').slice(-15).join('\n  ')
  throw new StepFailure(`MariaDB did not start. The end of ${log}:\n  ${tail}`, { said })
}

/** @param {string} socket */
async function answers(socket) {
  try {
    await runAsRoot(socket, 'select 1')
    return true
  } catch {
    return false
  }
}

/**
 * @param {string} socket
 * @param {string} sql goes through standard input: arguments can be read by every user of the machine
 */
function runAsRoot(socket, sql) {
  const login = [`--socket=${socket}`, `--user=${userInfo().username}`]
  return runProgram(
    program('mariadb'),
    ['--no-defaults', ...login, '--batch', '--skip-column-names'],
    { input: sql },
  )
}

/** @returns {string} a folder in which a socket's path stays within the limit */
function shortTemporaryFolder() {
  const longest = join(tmpdir(), 'dyw-XXXXXX', 'pid')
  return longest.length <= SOCKET_PATH_LIMIT ? tmpdir() : '/tmp'
}

/** @param {string} name */
function program(name) {
  const path = findProgram(name)
  if (path === undefined) throw new StepFailure(`${name} is not installed`)
  return path
}
