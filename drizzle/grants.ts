import type { Connection, RowDataPacket } from 'mysql2/promise'
import { APPEND_ONLY_TABLES } from '#drizzle/append-only.ts'
import { MIGRATION_STEPS_TABLE, MIGRATIONS_TABLE } from '#drizzle/migration-run.ts'

/** A database account as `user@host`. */
export type Grantee = `${string}@${string}`

/** What the service may look at and never touch. */
const MIGRATORS_TABLES: readonly string[] = [MIGRATIONS_TABLE, MIGRATION_STEPS_TABLE]
const NO_SUCH_GRANT = 1147

/**
 * Gives the service's user what it needs, table by table: no right on the database as a whole, so that a
 * table added later is closed until it is granted here.
 */
export async function grantServing(connection: Connection, grantee: Grantee): Promise<void> {
  const account = quotedAccount(connection, grantee)
  for (const table of await listTables(connection)) {
    const name = connection.escapeId(table)
    if (MIGRATORS_TABLES.includes(table)) {
      await connection.query(`grant select on ${name} to ${account}`)
    } else if (APPEND_ONLY_TABLES.includes(table)) {
      await revokeChanging(connection, `on ${name} from ${account}`)
      await connection.query(`grant select, insert on ${name} to ${account}`)
    } else {
      await connection.query(`grant select, insert, update, delete on ${name} to ${account}`)
    }
  }
}

async function listTables(connection: Connection): Promise<string[]> {
  const [rows] = await connection.query<(RowDataPacket & { name: string })[]>(
    `select table_name as name from information_schema.tables
      where table_schema = database() and table_type = 'BASE TABLE' order by table_name`,
  )
  return rows.map((row) => row.name)
}

/** A table that became append-only may still carry the wider grant of an earlier release. */
async function revokeChanging(connection: Connection, target: string): Promise<void> {
  try {
    await connection.query(`revoke update, delete ${target}`)
  } catch (error) {
    if ((error as { errno?: number }).errno !== NO_SUCH_GRANT) throw error
  }
}

function quotedAccount(connection: Connection, grantee: Grantee): string {
  const at = grantee.lastIndexOf('@')
  return `${connection.escape(grantee.slice(0, at))}@${connection.escape(grantee.slice(at + 1))}`
}
