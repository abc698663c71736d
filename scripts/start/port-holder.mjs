// @ts-check
import { readdirSync, readFileSync, readlinkSync } from 'node:fs'
import { createServer } from 'node:net'
import { commandLine, listPids } from '#scripts/start/processes.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

const LISTENING = '0A'

/**
 * Refuses, naming the holder, when somebody listens on the port already.
 * @param {{ host: string, port: number }} address
 */
export async function requireFreePort({ host, port }) {
  const error = await tryListening({ host, port })
  if (error === undefined) return
  if (error.code === 'EACCES') {
    throw new StepFailure(
      `This user may not listen on port ${port}. Choose another: PORT=4311 npm start`,
    )
  }
  if (error.code !== 'EADDRINUSE') throw new StepFailure(`Port ${port}: ${error.message}`)
  throw new StepFailure(
    `Port ${port} is taken by ${describeHolder(port)}.\nStop it, or choose another port: PORT=${port + 1} npm start`,
  )
}

/**
 * @param {{ host: string, port: number }} address
 * @returns {Promise<NodeJS.ErrnoException | undefined>}
 */
function tryListening({ host, port }) {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', resolve)
    server.listen(port, host, () => server.close(() => resolve(undefined)))
  })
}

/**
 * @param {number} port
 * @returns {string} `process PID (command)`, as far as this user may see it
 * @see proc_pid_net(5), /proc/net/tcp
 */
function describeHolder(port) {
  const sockets = new Set(listeningInodes(port).map((inode) => `socket:[${inode}]`))
  const pid = listPids().find((candidate) => openFiles(candidate).some((file) => sockets.has(file)))
  return pid === undefined
    ? "another user's process"
    : `process ${pid} (${commandLine(pid).join(' ')})`
}

/** @param {number} port */
function listeningInodes(port) {
  const wanted = port.toString(16).toUpperCase().padStart(4, '0')
  return ['/proc/net/tcp', '/proc/net/tcp6'].flatMap((table) =>
    readLines(table)
      .map((line) => line.trim().split(/\s+/))
      .filter(([, local, , state]) => local?.endsWith(`:${wanted}`) && state === LISTENING)
      .map((fields) => fields[9]),
  )
}

/** @param {string} file */
function readLines(file) {
  try {
    return readFileSync(file, 'utf8').split('\n').slice(1)
  } catch {
    return []
  }
}

/**
 * @param {number} pid
 * @returns {string[]}
 */
function openFiles(pid) {
  try {
    return readdirSync(`/proc/${pid}/fd`).flatMap((fd) => {
      try {
        return [readlinkSync(`/proc/${pid}/fd/${fd}`)]
      } catch {
        return []
      }
    })
  } catch {
    return []
  }
}
