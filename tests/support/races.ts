import { type ChildProcess, fork } from 'node:child_process'
import { once } from 'node:events'
import { Agent, request } from 'node:http'
import { compose } from '#api/compose.ts'
import { readConfig } from '#api/config.ts'
import { type Call, createClient, type Send } from '#shared/client/client.ts'
import { signIn } from '#shared/contracts/sessions.contract.ts'
import { createTestDatabase, type TestDatabase } from './database.ts'
import type { RaceMessage, Variant } from './race-server.ts'

/** Two API processes on one database, and an administrator signed in at both. */
export interface RaceTrack {
  readonly database: TestDatabase
  /** The client of one process (0 or 1), at one variant of the service. */
  client(process: 0 | 1, variant: Variant): Call
  /** Where one variant of one process listens. */
  origin(process: 0 | 1, variant: Variant): string
  /** How often the sound variant found, under the lock, that the head had moved. */
  overlaps(): number
  /** The process ids of the two. */
  pids(): (number | undefined)[]
  /** Ends one process by SIGKILL, between its next effect and that one's record, and starts another in its place. */
  kill(process: 0 | 1): Promise<void>
  close(): Promise<void>
}

const PROCESSES = 2
const MESSAGE_PATIENCE_MS = 10_000
const ACCOUNT = { email: 'race@larkhaven.example', password: 'four horses, one furlong' }

/**
 * @param settings of the service besides; without them no race runs into a rate limit
 * @param own a database to race on, dropped at the end; without one a new one
 */
export async function createRaceTrack(
  settings: Record<string, string> = {},
  own?: TestDatabase,
): Promise<RaceTrack> {
  const database = own ?? (await createTestDatabase())
  const env = {
    NODE_ENV: 'test',
    DATABASE_URL: database.serveUrl,
    LOG_LEVEL: 'fatal',
    PASSWORD_MEMORY_KIB: '64',
    PASSWORD_PASSES: '1',
    DATABASE_RELAXED_FLUSH: '1',
    RATE_CALLS_PER_ADDRESS: '10000000',
    RATE_CALLS_PER_SYSTEM: '10000000',
    ...settings,
  }
  await addAdministrator(env)
  let overlaps = 0
  const startOne = () => start(env, () => (overlaps += 1))
  const started = await Promise.all(Array.from({ length: PROCESSES }, startOne))
  const agent = new Agent({ keepAlive: true, maxSockets: 8 })
  const cookie = await signInAt(originOf(started[0], 'sound'), agent)
  return {
    database,
    client: (process, variant) =>
      createClient({
        baseUrl: originOf(started[process], variant),
        send: sendOver(agent),
        headers: { cookie },
      }),
    origin: (process, variant) => originOf(started[process], variant),
    overlaps: () => overlaps,
    pids: () =>
      started.filter(({ child }) => child.exitCode === null).map(({ child }) => child.pid),
    kill: async (process) => {
      const child = started[process]?.child
      if (child === undefined) throw new TypeError('No such process')
      await messageOf(child, 'unrecorded')
      const ended = once(child, 'exit')
      child.kill('SIGKILL')
      await ended
      started[process] = await startOne()
    },
    close: async () => {
      agent.destroy()
      await Promise.all(started.map(({ child }) => stop(child)))
      await database.drop()
    },
  }
}

interface Started {
  readonly child: ChildProcess
  readonly ports: Record<Variant, number>
}

function originOf(started: Started | undefined, variant: Variant): string {
  if (started === undefined) throw new TypeError('No such process')
  return `http://127.0.0.1:${started.ports[variant]}`
}

async function addAdministrator(env: Record<string, string>): Promise<void> {
  const read = readConfig(env)
  if (!read.ok) throw new TypeError(read.refusals.join('; '))
  const service = compose({ config: read.config })
  try {
    await service.services.accounts.create({ ...ACCOUNT, name: 'Race Steward', isAdmin: true })
  } finally {
    await service.close()
  }
}

async function start(env: Record<string, string>, onOverlap: () => void): Promise<Started> {
  const child = fork(new URL('./race-server.ts', import.meta.url), {
    env: { ...process.env, ...env },
    execArgv: ['--import', 'tsx'],
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
  })
  const ports = await new Promise<Record<Variant, number>>((resolve, reject) => {
    child.on('message', (message: RaceMessage) => {
      if ('ports' in message) resolve(message.ports)
      else if ('overlap' in message) onOverlap()
    })
    child.once('exit', (code) => reject(new Error(`The race server ended with ${code}`)))
  })
  return { child, ports }
}

const messageOf = (child: ChildProcess, name: string): Promise<void> =>
  new Promise((resolve, reject) => {
    const tooLate = setTimeout(() => reject(new Error(`No ${name} was told`)), MESSAGE_PATIENCE_MS)
    const hear = (message: RaceMessage): void => {
      if (!(name in message)) return
      clearTimeout(tooLate)
      child.off('message', hear)
      resolve()
    }
    child.on('message', hear)
  })

async function stop(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null) return
  const ended = once(child, 'exit')
  child.disconnect()
  await ended
}

const sendOver =
  (agent: Agent): Send =>
  ({ method, url, headers, body }) =>
    new Promise((resolve, reject) => {
      const call = request(url, { method, headers, agent }, (answer) => {
        const chunks: Buffer[] = []
        answer.on('data', (chunk: Buffer) => chunks.push(chunk))
        answer.on('end', () =>
          resolve({
            status: answer.statusCode ?? 0,
            headers: Object.fromEntries(
              Object.entries(answer.headers).map(([name, value]) => [name, String(value)]),
            ),
            body: Buffer.concat(chunks).toString('utf8'),
          }),
        )
        answer.on('error', reject)
      })
      call.on('error', reject)
      call.end(body)
    })

async function signInAt(origin: string, agent: Agent): Promise<string> {
  const answer = await sendOver(agent)({
    method: signIn.method,
    url: `${origin}${signIn.path}`,
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(ACCOUNT),
  })
  const cookie = answer.headers['set-cookie']?.split(';')[0]
  if (answer.status >= 300 || cookie === undefined) throw new Error(`Signing in: ${answer.body}`)
  return cookie
}
