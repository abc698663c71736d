import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { memberships, systems } from '#drizzle/schema/systems.ts'
import { users } from '#drizzle/schema/users.ts'

export interface MemberRow {
  readonly id: string
  readonly name: string
  readonly email: string
  readonly role: 'engineer' | 'maintainer' | 'accessibility-lead'
  readonly since: Date
}

/** Reads who works on a system, and how somebody stands in it. */
export const createMembersReads = (db: Executor) => ({
  /** The system of this key and how the person stands in it; a stranger's role is null. */
  findStanding: async (systemKey: string, userId: string) => {
    const [row] = await db
      .select({
        id: systems.id,
        key: systems.key,
        name: systems.name,
        role: memberships.role,
        isAdmin: sql<number>`exists(select 1 from ${users} where ${users.id} = ${userId} and ${users.isAdmin} and ${users.deactivatedAt} is null)`,
      })
      .from(systems)
      .leftJoin(
        memberships,
        and(eq(memberships.systemId, systems.id), eq(memberships.userId, userId)),
      )
      .where(eq(systems.key, systemKey))
    return row
  },

  rolesOf: (userId: string) =>
    db
      .select({ key: systems.key, role: memberships.role })
      .from(memberships)
      .innerJoin(systems, eq(systems.id, memberships.systemId))
      .where(eq(memberships.userId, userId))
      .orderBy(asc(systems.key)),

  list: (systemId: string): Promise<MemberRow[]> =>
    db
      .select({
        id: users.id,
        name: users.name,
        email: users.email,
        role: memberships.role,
        since: memberships.createdAt,
      })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(eq(memberships.systemId, systemId))
      .orderBy(asc(users.email)),

  /** Whether the person works on the system now. */
  isMember: async (systemId: string, userId: string): Promise<boolean> => {
    const [row] = await db
      .select({ id: users.id })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(
        and(eq(memberships.systemId, systemId), eq(users.id, userId), isNull(users.deactivatedAt)),
      )
    return row !== undefined
  },

  findPeople: (emails: readonly string[]) =>
    db
      .select({ id: users.id, email: users.email, name: users.name })
      .from(users)
      .where(and(inArray(users.email, [...emails]), isNull(users.deactivatedAt))),
})
