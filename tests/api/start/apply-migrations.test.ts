import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { applyMigrations } from '#drizzle/apply-migrations.ts'
import { createEmptyDatabase } from '#tests/support/database.ts'

type Database = Awaited<ReturnType<typeof createEmptyDatabase>>

let empty: Database
let folder: string

beforeEach(async () => {
  empty = await createEmptyDatabase()
  folder = mkdtempSync(join(tmpdir(), 'dyw-migrations-'))
})

afterEach(async () => {
  await empty.drop()
  rmSync(folder, { recursive: true })
})

describe('applyMigrations', () => {
  test('answers how many were new, once, however many processes call it at once', async () => {
    writeMigrations([
      'create table releases (id int primary key)',
      'create table notes (id int primary key)',
    ])
    const runs = await Promise.all([1, 2, 3].map(() => migrate()))
    expect(runs.toSorted()).toEqual([0, 0, 2])
    expect(await migrate()).toBe(0)
  })

  test('refuses the service UPDATE and DELETE where rows never change, and DDL everywhere', async () => {
    writeMigrations([
      'create table releases (id int primary key)',
      'create table notes (id int primary key)',
    ])
    await migrate()
    const served = await createConnection(empty.database.serveUrl)
    try {
      for (const table of ['releases', 'notes'])
        await served.query(`insert into ${table} values (1)`)
      await served.query('update notes set id = 2')
      await served.query('delete from notes')
      const refusals = [
        'update releases set id = 2',
        'delete from releases',
        'insert into releases values (1) on duplicate key update id = 2',
        'replace into releases values (1)',
        'truncate notes',
        'drop table notes',
        'create table more (id int)',
        'alter table notes add n int',
        'delete from __drizzle_migrations',
      ]
      for (const statement of refusals) expect(await errnoOf(served, statement)).toBe(1142)
      const [rows] = await served.query<RowDataPacket[]>('select id from releases')
      expect(rows).toEqual([{ id: 1 }])
    } finally {
      await served.end()
    }
  })

  test('leaves a wider grant of an earlier release taken back', async () => {
    writeMigrations(['create table releases (id int primary key)'])
    const admin = await createConnection(empty.database.adminUrl)
    await admin.query('create table releases (id int primary key)')
    await admin.query(`grant select, insert, update, delete on releases to ${empty.serveAccount}`)
    await admin.query('drop table releases')
    await admin.end()
    await migrate()
    const served = await createConnection(empty.database.serveUrl)
    expect(await errnoOf(served, 'delete from releases')).toBe(1142)
    await served.end()
  })
})

function migrate(): Promise<number> {
  return applyMigrations({ url: empty.database.migrateUrl, grantTo: empty.serveAccount, folder })
}

function writeMigrations(statements: readonly string[]): void {
  mkdirSync(join(folder, 'meta'))
  const entries = statements.map((_, idx) => ({
    idx,
    version: '5',
    when: 1_700_000_000_000 + idx,
    tag: `000${idx}_step`,
    breakpoints: true,
  }))
  writeFileSync(
    join(folder, 'meta', '_journal.json'),
    JSON.stringify({ version: '7', dialect: 'mysql', entries }),
  )
  for (const [idx, statement] of statements.entries()) {
    writeFileSync(join(folder, `000${idx}_step.sql`), `${statement};\n`)
  }
}

async function errnoOf(
  connection: Awaited<ReturnType<typeof createConnection>>,
  statement: string,
): Promise<number | undefined> {
  try {
    await connection.query(statement)
    return undefined
  } catch (error) {
    return (error as { errno?: number }).errno
  }
}
