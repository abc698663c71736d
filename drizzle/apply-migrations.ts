import { fileURLToPath } from 'node:url'
import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { type Grantee, grantServing } from '#drizzle/grants.ts'
import { runMigrations } from '#drizzle/migration-run.ts'

const LOCK_WAIT_SECONDS = 120

export interface MigrationRun {
  /** A `mysql://` address whose user may create and alter tables in the database. */
  readonly url: string
  /** The service's account; left out where an operator grants by hand. */
  readonly grantTo?: Grantee
  /** A folder written by `drizzle-kit generate`; without it the project's own. */
  readonly folder?: string
}

/**
 * Brings a database up to date and grants the service's user its rights. Several processes may call it at
 * once: a named lock, held by the one connection that also migrates, lets them in one by one.
 *
 * @returns how many migrations were new
 */
export async function applyMigrations(run: MigrationRun): Promise<number> {
  const connection = await createConnection({ uri: run.url, timezone: 'Z' })
  try {
    await takeLock(connection)
    const added = await runMigrations(connection, run.folder ?? migrationsFolder())
    if (run.grantTo !== undefined) await grantServing(connection, run.grantTo)
    return added
  } finally {
    await connection.end()
  }
}

/** Beside this module in the sources, beside the bundle in dist. */
function migrationsFolder(): string {
  return fileURLToPath(new URL('./migrations', import.meta.url))
}

type Connection = Awaited<ReturnType<typeof createConnection>>

async function takeLock(connection: Connection): Promise<void> {
  const [rows] = await connection.query<(RowDataPacket & { taken: number | null })[]>(
    `select get_lock(concat('migrate:', left(database(), 56)), ?) as taken`,
    [LOCK_WAIT_SECONDS],
  )
  if (rows[0]?.taken !== 1) {
    throw new Error(`another process has been migrating for ${LOCK_WAIT_SECONDS} s`)
  }
}
