import { and, asc, desc, eq, gt, inArray, lt, notExists, or, type SQL, sql } from 'drizzle-orm'
import { alias, QueryBuilder } from 'drizzle-orm/mysql-core'
import type { Executor } from '#api/platform/database.ts'
import { breachEvents, breaches } from '#drizzle/schema/breaches.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import { themeVersions } from '#drizzle/schema/themes.ts'
import { tokenVersions } from '#drizzle/schema/tokens.ts'
import { users } from '#drizzle/schema/users.ts'

export type BreachOrder = 'first-seen' | '-first-seen' | 'shortfall' | 'number'

/** Where a page ended. */
export interface BreachPlace {
  /** The part of what is required that is reached. */
  readonly reached: number
  readonly number: number
}

export interface BreachFilter {
  readonly statuses: readonly ('open' | 'waived' | 'resolved')[]
  readonly theme?: string | undefined
  readonly token?: string | undefined
  readonly kind?: (typeof breaches.$inferSelect)['kind'] | undefined
  readonly origin?: 'head' | 'ci' | undefined
}

export interface BreachPage {
  readonly order: BreachOrder
  readonly after: BreachPlace | undefined
  readonly limit: number
}

export type BreachesReads = ReturnType<typeof createBreachesReads>

/** Reads the breach log as screens and lists ask for it. */
export function createBreachesReads(db: Executor) {
  return {
    list(systemId: string, filter: BreachFilter, page: BreachPage) {
      return selectBreaches(db)
        .where(and(matching(systemId, filter), beyond(page)))
        .orderBy(...orderOf(page.order))
        .limit(page.limit)
    },

    async find(systemId: string, id: string) {
      const found = and(eq(breaches.systemId, systemId), eq(breaches.id, id))
      const [row] = await selectBreaches(db).where(found)
      return row
    },

    count(systemId: string, filter: BreachFilter): Promise<number> {
      return db.$count(breaches, matching(systemId, filter))
    },

    countEver(systemId: string): Promise<number> {
      return db.$count(breaches, eq(breaches.systemId, systemId))
    },

    listEvents(breachId: string) {
      return db
        .select({
          event: breachEvents,
          actor: { id: users.id, name: users.name },
          message: revisions.message,
        })
        .from(breachEvents)
        .innerJoin(breaches, eq(breaches.id, breachEvents.breachId))
        .leftJoin(users, eq(users.id, breachEvents.actorUserId))
        .leftJoin(
          revisions,
          and(
            eq(revisions.systemId, breaches.systemId),
            eq(revisions.number, breachEvents.revision),
          ),
        )
        .where(eq(breachEvents.breachId, breachId))
        .orderBy(asc(breachEvents.at), asc(breachEvents.id))
    },

    /** What tokens are called now, or were called last. */
    async tokenNames(systemId: string, ids: readonly string[]): Promise<Map<string, string>> {
      const rows = await db
        .select({ id: tokenVersions.tokenId, name: tokenVersions.name })
        .from(tokenVersions)
        .where(
          and(
            eq(tokenVersions.systemId, systemId),
            inArray(tokenVersions.tokenId, [...ids]),
            isLastVersion,
          ),
        )
      return new Map(rows.map(({ id, name }) => [id, name]))
    },
  }
}

export type ListedBreach = Awaited<ReturnType<BreachesReads['list']>>[number]
export type ListedBreachEvent = Awaited<ReturnType<BreachesReads['listEvents']>>[number]

/** The part of what is required that is reached: the furthest short has the least. */
const REACHED = sql<number>`(${breaches.ratio} / ${breaches.required})`.mapWith(Number)

const selectBreaches = (db: Executor) =>
  db
    .select({
      breach: breaches,
      assignee: { id: users.id, name: users.name },
      reached: REACHED.as('reached'),
    })
    .from(breaches)
    .leftJoin(users, eq(users.id, breaches.assigneeUserId))
    .$dynamic()

/** Numbers are taken under the head's lock, so they run in the order of first sight. */
function orderOf(order: BreachOrder): SQL[] {
  if (order === 'shortfall') return [asc(REACHED), asc(breaches.number)]
  return [order === '-first-seen' ? desc(breaches.number) : asc(breaches.number)]
}

function beyond({ order, after }: BreachPage): SQL | undefined {
  if (after === undefined) return undefined
  if (order === '-first-seen') return lt(breaches.number, after.number)
  const later = gt(breaches.number, after.number)
  if (order !== 'shortfall') return later
  // As a double, so that the bound is the very number that the row had.
  const bound = sql`cast(${String(after.reached)} as double)`
  return or(gt(REACHED, bound), and(sql`${REACHED} = ${bound}`, later))
}

function matching(systemId: string, filter: BreachFilter): SQL | undefined {
  const { statuses, kind, origin, token, theme } = filter
  return and(
    eq(breaches.systemId, systemId),
    inArray(breaches.status, [...statuses]),
    kind === undefined ? undefined : eq(breaches.kind, kind),
    origin === undefined ? undefined : eq(breaches.origin, origin),
    token === undefined ? undefined : naming(systemId, token),
    theme === undefined ? undefined : inArray(breaches.themeId, themesCalled(systemId, theme)),
  )
}

const query = new QueryBuilder()

/** On either side a token that is called so now, or was when it was deleted. */
function naming(systemId: string, name: string): SQL | undefined {
  const called = query
    .select({ id: tokenVersions.tokenId })
    .from(tokenVersions)
    .where(and(eq(tokenVersions.systemId, systemId), eq(tokenVersions.name, name), isLastVersion))
  return or(
    inArray(breaches.foregroundTokenId, called),
    inArray(breaches.backgroundTokenId, called),
  )
}

/** A theme keeps its key for life; a later one may take it up again. */
const themesCalled = (systemId: string, key: string) =>
  query
    .select({ id: themeVersions.themeId })
    .from(themeVersions)
    .where(and(eq(themeVersions.systemId, systemId), eq(themeVersions.key, key)))

const later = alias(tokenVersions, 'later')
const isLastVersion = notExists(
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
