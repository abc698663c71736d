import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { createConnection as connect } from 'node:net'
import { join } from 'node:path'
import { createConnection } from 'mysql2/promise'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { startMariadb } from '#scripts/start/mariadb.mjs'
import { processIdentity } from '#scripts/start/processes.mjs'
import { roomyFolder } from '#scripts/start/throw-away.mjs'

const HOST_NOT_ALLOWED = 1130

let parent: string
let folder: string

beforeEach(() => {
  parent = mkdtempSync(join(roomyFolder(), 'dyw-mariadb-'))
  folder = join(parent, 'data')
})

afterEach(() => rmSync(parent, { recursive: true, force: true }))

describe('startMariadb', () => {
  test('leaves a server with durable, strict, UTC and byte-exact settings', async () => {
    const server = await startMariadb({ folder })
    try {
      const settings = await server.asRoot(
        `select @@innodb_flush_log_at_trx_commit, @@innodb_doublewrite, @@time_zone, @@collation_server,
                @@sql_mode like '%STRICT_TRANS_TABLES%', @@bind_address`,
      )
      expect(settings.trim().split('\t')).toEqual([
        '1',
        '1',
        '+00:00',
        'utf8mb4_nopad_bin',
        '1',
        '127.0.0.1',
      ])
      const count = await server.asRoot(
        `create database d; create table d.t (name varchar(9) unique);
         insert into d.t values ('a'), ('A'), ('a '); select count(*) from d.t`,
      )
      expect(count.trim()).toBe('3')
    } finally {
      await server.stop()
    }
    expect(processIdentity(server.pid)).toBeUndefined()
  })

  test('refuses root over TCP, with and without a password', async () => {
    const server = await startMariadb({ folder, throwAway: true })
    try {
      for (const password of ['', 'root']) {
        const login = createConnection({
          host: '127.0.0.1',
          port: server.port,
          user: 'root',
          password,
        })
        await expect(login).rejects.toMatchObject({ errno: HOST_NOT_ALLOWED })
      }
    } finally {
      await server.stop()
    }
  })

  test('leaves committed rows after the server was killed, and ends an orphan on the folder', async () => {
    const first = await startMariadb({ folder })
    await first.asRoot(
      'create database d; create table d.t (id int primary key); insert into d.t values (7)',
    )
    process.kill(first.pid, 'SIGKILL')
    await first.exited
    const second = await startMariadb({ folder, port: first.port })
    expect(second.port).toBe(first.port)
    const third = await startMariadb({ folder })
    await second.exited
    expect(await third.asRoot('select id from d.t')).toBe('7\n')
    await third.stop()
  })

  test('leaves a half-made folder of an interrupted installation behind', async () => {
    mkdirSync(`${folder}.tmp/mysql`, { recursive: true })
    writeFileSync(`${folder}.tmp/ibdata1`, 'half')
    const server = await startMariadb({ folder, throwAway: true })
    expect(await server.asRoot('select 1')).toBe('1\n')
    await server.stop()
  })

  test('refuses with the reason from its log when it cannot start', async () => {
    const blocker = await startMariadb({ folder, throwAway: true })
    const failing = startMariadb({ folder: join(parent, 'other'), port: blocker.port })
    await expect(failing).rejects.toThrow(/MariaDB did not start[\s\S]*port: \d+/i)
    await expect(canConnect(blocker.port)).resolves.toBe(true)
    await blocker.stop()
  })
})

function canConnect(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1')
    socket.once('connect', () => resolve(true)).once('error', () => resolve(false))
    socket.once('connect', () => socket.destroy())
  })
}
