import type { Pool, RowDataPacket } from 'mysql2/promise'

/** What the service relies on of its database. */
export interface DatabaseSettings {
  readonly flush: number
  readonly sqlMode: string
  readonly charset: string
  readonly collation: string
  readonly timeZone: string
  readonly systemTimeZone: string
}

/** Answers the settings as a session of the service meets them. */
export async function readDatabaseSettings(pool: Pool): Promise<DatabaseSettings> {
  const [rows] = await pool.query<(RowDataPacket & DatabaseSettings)[]>(
    `select @@global.innodb_flush_log_at_trx_commit as flush, @@session.sql_mode as sqlMode,
            @@session.character_set_database as charset, @@session.collation_database as collation,
            @@session.time_zone as timeZone, @@global.system_time_zone as systemTimeZone`,
  )
  const [row] = rows
  if (row === undefined) throw new TypeError('The database does not tell its settings')
  return row
}

const UTC = ['+00:00', 'UTC', 'Etc/UTC']

/**
 * Answers every setting under which acknowledged writes, names or deadlines would not be safe.
 * @param relaxedFlush leave the one out that only costs durability: for tests
 * @see https://mariadb.com/docs/server/server-usage/storage-engines/innodb/innodb-system-variables
 */
export function unsafeSettings(settings: DatabaseSettings, relaxedFlush: boolean): string[] {
  const { flush, sqlMode, charset, collation, timeZone, systemTimeZone } = settings
  const isStrict = /\b(STRICT_TRANS_TABLES|STRICT_ALL_TABLES)\b/.test(sqlMode)
  const isUtc = UTC.includes(timeZone) || (timeZone === 'SYSTEM' && UTC.includes(systemTimeZone))
  return [
    ...(flush === 1 || relaxedFlush
      ? []
      : [`innodb_flush_log_at_trx_commit is ${flush}: it must be 1, or a crash loses writes`]),
    ...(isStrict ? [] : ['sql_mode has no STRICT_TRANS_TABLES: values would be cut silently']),
    ...(charset === 'utf8mb4' ? [] : [`the database's character set is ${charset}, not utf8mb4`]),
    ...(collation === 'utf8mb4_nopad_bin'
      ? []
      : [
          `the database's collation is ${collation}, not utf8mb4_nopad_bin: names would be taken for others`,
        ]),
    ...(isUtc ? [] : [`time_zone is ${timeZone} (${systemTimeZone}): it must be +00:00`]),
  ]
}
