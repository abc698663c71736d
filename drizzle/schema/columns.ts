import { sql } from 'drizzle-orm'
import { customType, datetime, int, varchar } from 'drizzle-orm/mysql-core'

/** The end of a version that is still in force: the greatest unsigned 32-bit integer. */
export const STILL_LIVE = 4_294_967_295

/** A prefixed id such as `tok_01jd5w7k2m…`. */
export const idColumn = (name: string) => varchar(name, { length: 40 })

/** A point in time, UTC, to the millisecond. */
export const instantColumn = (name: string) => datetime(name, { fsp: 3, mode: 'date' })

/** The database's clock at the insert; sessions run in UTC. */
export const insertedAt = (name: string) =>
  instantColumn(name).notNull().default(sql`current_timestamp(3)`)

/** SHA-256 in lower-case hexadecimal. */
export const digestColumn = (name: string) => varchar(name, { length: 64 })

/** Number of a revision. */
export const revisionColumn = (name: string) => int(name, { unsigned: true })

/** A row's optimistic lock: an UPDATE names the version it read and adds one. */
export const versionColumn = () => int('version', { unsigned: true }).notNull().default(1)

/** Bytes, up to 16 MiB. */
export const bytesColumn = customType<{ data: Buffer }>({ dataType: () => 'mediumblob' })

/** Text, up to 16 MiB, kept to the byte; unlike a JSON column it is never parsed on its way out. */
export const verbatimColumn = customType<{ data: string }>({ dataType: () => 'mediumtext' })

/** The parent cannot be deleted or renumbered: a cascade would empty a table that no grant opens. */
export const RESTRICT = { onDelete: 'restrict', onUpdate: 'restrict' } as const
