import { type MigrationMeta, readMigrationFiles } from 'drizzle-orm/migrator'
import type { Connection, ResultSetHeader, RowDataPacket } from 'mysql2/promise'

/** Which migrations are done: the table that the migration generator's own runner would keep. */
export const MIGRATIONS_TABLE = '__drizzle_migrations'
/** How far the migration at work has come. */
export const MIGRATION_STEPS_TABLE = 'migration_steps'

/** What the server says of a statement whose effect is there already (table, column, key, trigger, constraint). */
const DONE_ALREADY: readonly unknown[] = [1050, 1060, 1061, 1091, 1051, 1359, 1360, 1826]

/**
 * Runs what a folder written by `drizzle-kit generate` holds and this database lacks. Each statement is noted
 * when it is done, since the server commits every change of a table at once: a run that broke off half-way is
 * taken up at its first statement that is not noted, which may have been done without its note.
 *
 * @returns how many migrations were finished
 * @throws the driver's error of the statement that failed; what came before it stays done and noted
 * @see https://mariadb.com/kb/en/sql-statements-that-cause-an-implicit-commit/
 */
export async function runMigrations(connection: Connection, folder: string): Promise<number> {
  await createNotes(connection)
  const last = await lastFinished(connection)
  const missing = readMigrationFiles({ migrationsFolder: folder }).filter(
    (migration) => migration.folderMillis > last,
  )
  for (const migration of missing) await runMigration(connection, migration)
  return missing.length
}

async function runMigration(connection: Connection, migration: MigrationMeta): Promise<void> {
  const { brokeOff, done } = await begin(connection, migration.hash)
  for (const [index, statement] of migration.sql.entries()) {
    if (index < done) continue
    // Rows that a statement writes and its note are committed together.
    await connection.beginTransaction()
    await runStatement(connection, statement, { again: brokeOff && index === done })
    await connection.query(`update ${MIGRATION_STEPS_TABLE} set done = ?`, [index + 1])
    await connection.commit()
  }
  await connection.beginTransaction()
  await connection.query(`insert into ${MIGRATIONS_TABLE} (hash, created_at) values (?, ?)`, [
    migration.hash,
    migration.folderMillis,
  ])
  await connection.query(`delete from ${MIGRATION_STEPS_TABLE}`)
  await connection.commit()
}

async function runStatement(
  connection: Connection,
  statement: string,
  { again }: { again: boolean },
): Promise<void> {
  try {
    await connection.query(statement)
  } catch (error) {
    if (again && isDoneAlready(error)) return
    await connection.rollback()
    await connection.query(`update ${MIGRATION_STEPS_TABLE} set refused = true`)
    throw error
  }
}

function isDoneAlready(error: unknown): boolean {
  const { errno, message } = error as { errno?: unknown; message?: string }
  // A foreign key of this name is reported as a table that cannot be made.
  if (errno === 1005) return message?.includes('errno: 121 ') === true
  return DONE_ALREADY.includes(errno)
}

async function createNotes(connection: Connection): Promise<void> {
  await connection.query(`create table if not exists ${MIGRATIONS_TABLE} (
    id serial primary key, hash text not null, created_at bigint)`)
  await connection.query(`create table if not exists ${MIGRATION_STEPS_TABLE} (
    hash char(64) character set ascii primary key, done int unsigned not null,
    refused boolean not null)`)
}

async function lastFinished(connection: Connection): Promise<number> {
  const [rows] = await connection.query<(RowDataPacket & { last: number | null })[]>(
    `select max(created_at) as last from ${MIGRATIONS_TABLE}`,
  )
  return Number(rows[0]?.last ?? 0)
}

/**
 * Notes that the migration is at work; where that was noted already, an earlier run broke off in it, unless the
 * server refused its next statement, which then has certainly done nothing.
 */
async function begin(connection: Connection, hash: string) {
  const [noted] = await connection.query<ResultSetHeader>(
    `insert ignore into ${MIGRATION_STEPS_TABLE} values (?, 0, false)`,
    [hash],
  )
  const [[steps, another]] = await connection.query<StepsRow[]>(
    `select done, refused from ${MIGRATION_STEPS_TABLE}`,
  )
  if (steps === undefined || another !== undefined) {
    throw new Error(
      'another release’s migration broke off half-way: start the release that began it',
    )
  }
  await connection.query(`update ${MIGRATION_STEPS_TABLE} set refused = false`)
  return { brokeOff: noted.affectedRows === 0 && !steps.refused, done: steps.done }
}

interface StepsRow extends RowDataPacket {
  readonly done: number
  readonly refused: number
}
