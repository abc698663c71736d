import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { createConnection } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { findProcesses, processIdentity } from '#scripts/start/processes.mjs'
import { demoPeople } from '#scripts/start/seeding.mjs'
import { createTestDatabase, type TestDatabase } from '#tests/support/database.ts'
import {
  copyProject,
  exitOf,
  type ProjectCopy,
  READY,
  type Start,
  stop,
  untilSaid,
} from '#tests/support/project-copy.ts'

let copy: ProjectCopy
let folder: string
let url: string
let running: Start | undefined

beforeAll(async () => {
  copy = await copyProject()
  folder = copy.folder
  url = copy.url
})

afterAll(async () => {
  if (running !== undefined) await stop(running)
  copy.remove()
})

describe('npm start', () => {
  test('answers 503 from readyz until the demo is loaded, then says what to do next', async () => {
    running = copy.start()
    const seen = await watchReadiness(running)
    await untilSaid(running, READY)
    expect(seen).toContain(503)
    expect(await copy.statusOf('/readyz')).toBe(200)
    const said = running.output()
    expect(said).toContain(`${READY} ${url}`)
    expect(said).toMatch(new RegExp(`^password  ${demoPeople().password}$`, 'm'))
    for (const { email, listed } of demoPeople().accounts) expect(said.includes(email)).toBe(listed)
    for (const step of [
      'Node',
      'Packages',
      'MariaDB',
      'Database',
      'Migrations',
      'Service',
      'Demo',
    ]) {
      expect(said).toMatch(new RegExp(`^${step} +\\d+\\.\\d s`, 'm'))
    }
  })

  test('answers the printed curl, and fails and passes the printed gate', async () => {
    const said = running?.output() ?? ''
    const [, keyFile, address] = /^ {2}curl -H .*\(cat (\S+)\)" (\S+)$/m.exec(said) ?? []
    expect(address).toContain(url)
    const theme = await fetch(address!, {
      headers: { authorization: `Bearer ${readFileSync(join(folder, keyFile!), 'utf8').trim()}` },
    })
    expect(await theme.text()).toContain(':root')
    const gate = /^ {2}DYEWRIGHT_KEY=.*$/m.exec(said)?.[0] ?? ''
    expect(copy.shell(gate).status).toBe(1)
    expect(copy.shell(gate.replace('breaching-change', 'fix')).status).toBe(0)
  })

  test('refuses a second start in the folder, naming the first', async () => {
    const second = copy.start()
    expect(await exitOf(second.child)).toBe(1)
    expect(second.output()).toContain(
      `npm start already runs in this folder: process ${running?.child.pid}.`,
    )
  })

  test('answers 503 while a killed MariaDB is started again, with the service up all along', async () => {
    const [service] = findProcesses(join(folder, 'dist/api/server.js'))
    const identity = processIdentity(service!)
    const [database] = findProcesses(`--datadir=${join(folder, '.data/mariadb')}`)
    process.kill(database!, 'SIGKILL')
    const seen: number[] = []
    const deadline = Date.now() + 20_000
    do {
      seen.push(await copy.statusOf('/readyz'))
      await delay(20)
    } while ((seen.at(-1) !== 200 || !seen.includes(503)) && Date.now() < deadline)
    expect(seen.filter((status) => status !== 200 && status !== 503)).toEqual([])
    expect(seen).toContain(503)
    expect(seen.at(-1)).toBe(200)
    expect(processIdentity(service!)).toBe(identity)
  })

  test('leaves nothing running after SIGTERM, and the data for the next start', async () => {
    const key = readFileSync(join(folder, '.data/demo-ci-key'), 'utf8')
    expect(await stop(running!)).toBe(0)
    expect(findProcesses(`--datadir=${join(folder, '.data/mariadb')}`)).toEqual([])
    expect(findProcesses(join(folder, 'dist/api/server.js'))).toEqual([])
    expect(existsSync(join(folder, '.data/database-url'))).toBe(false)
    running = copy.start()
    await untilSaid(running, READY)
    expect(running.output()).not.toMatch(/^Demo /m)
    expect(running.output()).toContain('unchanged')
    const answer = await fetch(`${url}/v1/systems/larkhaven/themes/dark.css`, {
      headers: { authorization: `Bearer ${key.trim()}` },
    })
    expect(answer.status).toBe(200)
  })

  test('leaves no orphan of a start that was killed in the way of the next', async () => {
    running!.child.kill('SIGKILL')
    await exitOf(running!.child)
    expect(findProcesses(join(folder, 'dist/api/server.js'))).toHaveLength(1)
    running = copy.start()
    await untilSaid(running, READY)
    expect(running.output()).toMatch(/^Tidying .*left by a start that was killed$/m)
    expect(findProcesses(join(folder, 'dist/api/server.js'))).toHaveLength(1)
  })

  test('refuses the demo’s database in production, by name', async () => {
    await stop(running!)
    running = undefined
    const production = copy.start({
      env: { NODE_ENV: 'production', PUBLIC_URL: 'https://dyewright.example' },
    })
    expect(await exitOf(production.child)).toBe(1)
    expect(production.output()).toMatch(
      /refused to start: the database has \d+ accounts of the demo/,
    )
  })
})

describe('npm start in production on a database of one’s own', () => {
  let database: TestDatabase
  beforeAll(async () => {
    database = await createTestDatabase()
  })
  afterAll(async () => {
    await setFlush(0)
    await database.drop()
  })

  /** The server of the tests does not flush at commit, until told to. */
  async function setFlush(value: 0 | 1): Promise<void> {
    const connection = await createConnection(database.adminUrl)
    await connection.query(`set global innodb_flush_log_at_trx_commit = ${value}`)
    await connection.end()
  }

  const startInProduction = () =>
    copy.start({
      env: {
        NODE_ENV: 'production',
        PUBLIC_URL: 'https://dyewright.example',
        DATABASE_URL: database.serveUrl,
        MIGRATE_DATABASE_URL: database.migrateUrl,
      },
    })

  test('refuses one that does not flush at commit, by name', async () => {
    const refused = startInProduction()
    expect(await exitOf(refused.child)).toBe(1)
    expect(refused.output()).toContain('innodb_flush_log_at_trx_commit')
  })

  test('serves from a safe one, with no private database and no demo', async () => {
    await setFlush(1)
    const safe = startInProduction()
    await untilSaid(safe, READY)
    expect(findProcesses(`--datadir=${join(folder, '.data/mariadb')}`)).toEqual([])
    expect(safe.output()).not.toMatch(/^(MariaDB|Database|Accounts|Demo) /m)
    expect(safe.output()).not.toContain(demoPeople().password)
    expect(await copy.statusOf('/readyz')).toBe(200)
    expect(await stop(safe)).toBe(0)
  })
})

/** Asks all along, from before anybody listens until it is ready. */
async function watchReadiness({ child }: Start): Promise<number[]> {
  const seen: number[] = []
  while (seen.at(-1) !== 200 && child.exitCode === null) {
    seen.push(await copy.statusOf('/readyz'))
    await delay(50)
  }
  return seen
}
