import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { type Connection, createConnection, type RowDataPacket } from 'mysql2/promise'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { applyMigrations } from '#drizzle/apply-migrations.ts'
import { createEmptyDatabase } from '#tests/support/database.ts'

let empty: Awaited<ReturnType<typeof createEmptyDatabase>>
let admin: Connection
let folder: string

async function makeEmpty(): Promise<void> {
  empty = await createEmptyDatabase()
  admin = await createConnection(empty.database.adminUrl)
}

beforeEach(async () => {
  await makeEmpty()
  folder = mkdtempSync(join(tmpdir(), 'dyw-migrations-'))
})

afterEach(async () => {
  await admin.end()
  await empty.drop()
  rmSync(folder, { recursive: true })
})

describe('a migration that broke off', () => {
  test.each([1, 9, 23, 34])('leaves the same database after a kill at table %i', async (tables) => {
    await untilKilledAt(tables)
    await applyMigrations({ url: empty.database.migrateUrl, grantTo: empty.serveAccount })
    expect(await countOf('migration_steps')).toBe(0)
    expect(await shapeOf(empty.database.name)).toEqual(await shapeOfAStraightRun())
  })

  test('leaves what a statement did without its note, and goes on after it', async () => {
    writeMigration(BREAKABLE)
    for (let done = 0; done < BREAKABLE.length; done += 1) {
      expect(await applyFolder()).toBe(1)
      await rerunFrom(done)
      expect(await applyFolder()).toBe(1)
      expect(await countOf('b')).toBe(0)
      for (const table of ['b', 'a']) await admin.query(`drop table ${table}`)
      await admin.query('delete from __drizzle_migrations')
    }
  })

  test('refuses a statement that fails for another reason, again and again', async () => {
    writeMigration(['create table a (id int)', 'create table a (id int)'])
    for (const _ of [1, 2]) await expect(applyFolder()).rejects.toThrow(/already exists/)
    expect(await countOf('migration_steps')).toBe(1)
  })

  test('refuses to go on where another release’s migration broke off', async () => {
    writeMigration(['create table a (id int)'])
    await applyFolder()
    await admin.query(`delete from __drizzle_migrations`)
    await admin.query(`insert into migration_steps values (repeat('0', 64), 1, false)`)
    await expect(applyFolder()).rejects.toThrow(/start the release that began it/)
  })
})

const BREAKABLE = [
  'create table a (id int primary key, n int)',
  'create table b (id int primary key, a int)',
  'alter table a add column more int',
  'create index b_a_idx on b (a)',
  'alter table b add constraint b_a_fk foreign key (a) references a (id)',
  "create trigger b_no before delete on b for each row signal sqlstate '45000'",
  'alter table a drop column n',
]

function applyFolder(): Promise<number> {
  return applyMigrations({ url: empty.database.migrateUrl, folder })
}

/** As if the process had been killed between a statement and its note, and the later ones never run. */
async function rerunFrom(done: number): Promise<void> {
  const [rows] = await admin.query<RowDataPacket[]>('select hash from __drizzle_migrations')
  await admin.query('delete from __drizzle_migrations')
  await admin.query('insert into migration_steps values (?, ?, false)', [rows[0]?.hash, done])
  for (const undo of UNDO.slice(done + 1).reverse()) await admin.query(undo)
}

const UNDO = [
  'drop table a',
  'drop table b',
  'alter table a drop column more',
  'drop index b_a_idx on b',
  'alter table b drop foreign key b_a_fk',
  'drop trigger b_no',
  'alter table a add column n int',
]

/** A migration may be done, or between two, before the kill comes: then it is tried again on another database. */
async function untilKilledAt(tables: number): Promise<void> {
  while (!(await killMigrationAt(tables))) {
    await admin.end()
    await empty.drop()
    await makeEmpty()
  }
}

/** @returns whether the kill met it half-way */
async function killMigrationAt(tables: number): Promise<boolean> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'drizzle/migrate.ts'], {
    env: { ...process.env, MIGRATE_DATABASE_URL: empty.database.migrateUrl },
    stdio: 'ignore',
  })
  const ended = once(child, 'exit')
  while (child.exitCode === null && (await countTables()) < tables);
  child.kill('SIGKILL')
  await ended
  return (await countOf('migration_steps')) === 1
}

async function countTables(): Promise<number> {
  const [rows] = await admin.query<RowDataPacket[]>(
    'select count(*) as n from information_schema.tables where table_schema = database()',
  )
  return Number(rows[0]?.n) - 2
}

async function countOf(table: string): Promise<number> {
  const [rows] = await admin.query<RowDataPacket[]>(`select count(*) as n from ${table}`)
  return Number(rows[0]?.n)
}

async function shapeOfAStraightRun() {
  const straight = await createEmptyDatabase()
  try {
    await applyMigrations({ url: straight.database.migrateUrl })
    return await shapeOf(straight.database.name)
  } finally {
    await straight.drop()
  }
}

/** Columns, keys, foreign keys and triggers, without the name of the database. */
async function shapeOf(name: string): Promise<unknown[]> {
  const parts = [
    `select table_name, column_name, column_type, is_nullable, column_default
       from information_schema.columns where table_schema = ? order by 1, ordinal_position`,
    `select table_name, index_name, seq_in_index, column_name, non_unique
       from information_schema.statistics where table_schema = ? order by 1, 2, 3`,
    `select table_name, constraint_name, delete_rule
       from information_schema.referential_constraints where constraint_schema = ? order by 1, 2`,
    `select trigger_name, event_manipulation, event_object_table
       from information_schema.triggers where trigger_schema = ? order by 1`,
  ]
  return Promise.all(parts.map(async (part) => (await admin.query(part, [name]))[0]))
}

function writeMigration(statements: readonly string[]): void {
  mkdirSync(join(folder, 'meta'))
  const entry = { idx: 0, version: '5', when: 1_700_000_000_000, tag: '0000_s', breakpoints: true }
  writeFileSync(
    join(folder, 'meta', '_journal.json'),
    JSON.stringify({ version: '7', dialect: 'mysql', entries: [entry] }),
  )
  writeFileSync(join(folder, '0000_s.sql'), statements.join('\n--> statement-breakpoint\n'))
}
