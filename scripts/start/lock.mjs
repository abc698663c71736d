// @ts-check
import { createHash } from 'node:crypto'
import { connect, createServer } from 'node:net'
import { ROOT } from '#scripts/start/project.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

/** What only one process at a time may do in this folder. */
export const LOCKS = { serving: 'serving', installing: 'installing' }

const ANSWER_WITHIN_MS = 2_000

/**
 * Takes a lock of this folder without waiting. It is a name in the kernel's table of abstract sockets: it
 * goes with its process, however that ends, so no lock is ever stale.
 * @param {string} name one of LOCKS
 * @returns {Promise<{ release: () => void, holder?: number }>} with `holder` when another process has it
 * @see unix(7), "abstract"
 */
export async function holdLock(name) {
  const folder = createHash('sha256').update(ROOT).digest('hex').slice(0, 24)
  const address = `\0dyewright-${folder}-${name}`
  const server = createServer((socket) => socket.on('error', () => {}).end(String(process.pid)))
  server.unref()
  const taken = await new Promise((resolve, reject) => {
    server.once('listening', () => resolve(false))
    server.once('error', (/** @type {NodeJS.ErrnoException} */ error) =>
      error.code === 'EADDRINUSE' ? resolve(true) : reject(error),
    )
    server.listen(address)
  })
  if (!taken) return { release: () => server.close() }
  return { release: () => {}, holder: await askHolder(address) }
}

/**
 * @param {string} address
 * @returns {Promise<number>}
 */
function askHolder(address) {
  return new Promise((resolve, reject) => {
    let answer = ''
    const socket = connect(address)
    const giveUp = () => reject(new StepFailure('Another process is at work in this folder.'))
    socket.setEncoding('utf8').setTimeout(ANSWER_WITHIN_MS, giveUp)
    socket.on('data', (text) => {
      answer += text
    })
    socket.once('error', giveUp)
    socket.once('end', () => resolve(Number(answer)))
  })
}
