import { and, asc, eq, inArray } from 'drizzle-orm'
import { alias } from 'drizzle-orm/mysql-core'
import type { Executor } from '#api/platform/database.ts'
import { breachEvents, breaches } from '#drizzle/schema/breaches.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import { tokenVersions } from '#drizzle/schema/tokens.ts'
import { users } from '#drizzle/schema/users.ts'
import { type BreachFilter, isLastVersion, matchesFilter } from './breach-matches.reads.ts'
import {
  type BreachOrder,
  type BreachPage,
  beyond,
  orderedBy,
  orderOf,
} from './breach-order.reads.ts'

export type BreachesReads = ReturnType<typeof createBreachesReads>

/** Reads the breach log as screens and lists ask for it. */
export function createBreachesReads(db: Executor) {
  return {
    list(systemId: string, filter: BreachFilter, page: BreachPage) {
      return selectBreaches(db, page.order)
        .where(and(matchesFilter(systemId, filter), beyond(page)))
        .orderBy(...orderOf(page.order))
        .limit(page.limit)
    },

    async find(systemId: string, id: string) {
      const found = and(eq(breaches.systemId, systemId), eq(breaches.id, id))
      const [row] = await selectBreaches(db, 'number').where(found)
      return row
    },

    count(systemId: string, filter: BreachFilter): Promise<number> {
      return db.$count(breaches, matchesFilter(systemId, filter))
    },

    countEver(systemId: string): Promise<number> {
      return db.$count(breaches, eq(breaches.systemId, systemId))
    },

    listEvents(breachId: string) {
      return selectEvents(db)
        .where(eq(breachEvents.breachId, breachId))
        .orderBy(asc(breachEvents.at), asc(breachEvents.id))
    },

    async findEvent(id: string) {
      const [row] = await selectEvents(db).where(eq(breachEvents.id, id))
      return row
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

const selectBreaches = (db: Executor, order: BreachOrder) =>
  db
    .select({
      breach: breaches,
      assignee: { id: users.id, name: users.name },
      orderedBy: orderedBy(order).as('ordered_by'),
    })
    .from(breaches)
    .leftJoin(users, eq(users.id, breaches.assigneeUserId))
    .$dynamic()

const assignees = alias(users, 'assignees')

const selectEvents = (db: Executor) =>
  db
    .select({
      event: breachEvents,
      actor: { id: users.id, name: users.name },
      assignee: { id: assignees.id, name: assignees.name },
      message: revisions.message,
    })
    .from(breachEvents)
    .innerJoin(breaches, eq(breaches.id, breachEvents.breachId))
    .leftJoin(users, eq(users.id, breachEvents.actorUserId))
    .leftJoin(assignees, eq(assignees.id, breachEvents.assigneeUserId))
    .leftJoin(
      revisions,
      and(eq(revisions.systemId, breaches.systemId), eq(revisions.number, breachEvents.revision)),
    )
    .$dynamic()
