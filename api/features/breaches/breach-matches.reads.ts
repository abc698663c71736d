import {
  and,
  eq,
  gt,
  gte,
  inArray,
  isNull,
  like,
  lt,
  notExists,
  or,
  type SQL,
  sql,
} from 'drizzle-orm'
import { type AnyMySqlColumn, alias, QueryBuilder } from 'drizzle-orm/mysql-core'
import { breaches } from '#drizzle/schema/breaches.ts'
import { themeVersions } from '#drizzle/schema/themes.ts'
import { tokenVersions } from '#drizzle/schema/tokens.ts'

type Row = typeof breaches.$inferSelect

/** What of the log is asked for; names are those of now, or the last of what is gone. */
export interface BreachFilter {
  readonly statuses: readonly Row['status'][]
  readonly theme?: string | undefined
  readonly kind?: Row['kind'] | undefined
  readonly use?: Row['use'] | undefined
  /** On either side. */
  readonly token?: string | undefined
  readonly foreground?: string | undefined
  readonly background?: string | undefined
  /** A person's id; null: nobody. */
  readonly assignee?: string | null | undefined
  readonly since?: Date | undefined
  readonly before?: Date | undefined
  readonly origin?: Row['origin'] | undefined
  readonly repository?: string | undefined
  readonly branch?: string | undefined
  /** Part of a name, or a number of the log. */
  readonly q?: string | undefined
}

/** The columns by which a row says what it is about: an entry of the log, or a sighting. */
export type SubjectColumns = {
  readonly [column in 'foregroundTokenId' | 'backgroundTokenId' | 'names']: AnyMySqlColumn
}

type Side = 'foreground' | 'background'

export function matchesFilter(systemId: string, filter: BreachFilter): SQL | undefined {
  const { statuses, theme, token, foreground, background, assignee, since, before, q } = filter
  const named = (side: Side, name: string) =>
    onSide(breaches, side, { systemId, called: (column) => sql`${column} = ${name}` })
  return and(
    eq(breaches.systemId, systemId),
    inArray(breaches.status, [...statuses]),
    ...EXACT.map((name) => {
      const wanted = filter[name]
      return wanted === undefined ? undefined : eq(breaches[name], wanted)
    }),
    theme === undefined ? undefined : inArray(breaches.themeId, themesCalled(systemId, theme)),
    token === undefined ? undefined : naming(breaches, systemId, token),
    foreground === undefined ? undefined : named('foreground', foreground),
    background === undefined ? undefined : named('background', background),
    assignee === undefined ? undefined : assignedTo(assignee),
    since === undefined ? undefined : gte(breaches.firstSeenAt, since),
    before === undefined ? undefined : lt(breaches.firstSeenAt, before),
    q === undefined ? undefined : speaksOf(systemId, q),
  )
}

const EXACT = ['kind', 'use', 'origin', 'repository', 'branch'] as const

const assignedTo = (id: string | null) =>
  id === null ? isNull(breaches.assigneeUserId) : eq(breaches.assigneeUserId, id)

/** On either side a token that is called so now, or was when it was deleted. */
export const naming = (row: SubjectColumns, systemId: string, name: string): SQL | undefined => {
  const named = { systemId, called: (column: Named) => sql`${column} = ${name}` }
  return or(onSide(row, 'foreground', named), onSide(row, 'background', named))
}

function speaksOf(systemId: string, q: string): SQL | undefined {
  const pattern = `%${q.toLowerCase().replace(/[\\%_]/g, '\\$&')}%`
  const named = { systemId, called: (column: Named) => like(sql`lower(${column})`, pattern) }
  const number = /^#?(\d{1,9})$/.exec(q)?.[1]
  return or(
    onSide(breaches, 'foreground', named),
    onSide(breaches, 'background', named),
    number === undefined ? undefined : eq(breaches.number, Number(number)),
  )
}

type Named = (typeof tokenVersions)['name'] | SQL

interface Naming {
  readonly systemId: string
  readonly called: (column: Named) => SQL
}

const query = new QueryBuilder()

/** A candidate's token is in no table: it is called what its row says. */
function onSide(row: SubjectColumns, side: Side, { systemId, called }: Naming): SQL | undefined {
  const id = row[`${side}TokenId`]
  const known = query
    .select({ id: tokenVersions.tokenId })
    .from(tokenVersions)
    .where(and(eq(tokenVersions.systemId, systemId), called(tokenVersions.name), isLastVersion))
  const written = sql`json_value(${row.names}, ${sql.raw(`'$.${side}'`)})`
  return or(inArray(id, known), and(like(id, 'new:%'), called(written)))
}

/** A theme keeps its key for life; a later one may take it up again. */
export const themesCalled = (systemId: string, key: string) =>
  query
    .select({ id: themeVersions.themeId })
    .from(themeVersions)
    .where(and(eq(themeVersions.systemId, systemId), eq(themeVersions.key, key)))

const later = alias(tokenVersions, 'later')
/** Of a token that is there the version in force, else the one before it went. */
export const isLastVersion = notExists(
  query
    .select({ one: sql`1` })
    .from(later)
    .where(
      and(
        eq(later.systemId, tokenVersions.systemId),
        eq(later.tokenId, tokenVersions.tokenId),
        gt(later.fromRevision, tokenVersions.fromRevision),
      ),
    ),
)
