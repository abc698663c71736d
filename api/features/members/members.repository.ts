import { and, eq, inArray, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { memberships, systemHeads } from '#drizzle/schema/systems.ts'
import { createMembersReads } from './members.reads.ts'
import type { MembershipMove } from './members.rules.ts'

/** Writes who works on a system, beside the reading of it. */
export const createMembersRepository = (db: Executor) => ({
  ...createMembersReads(db),

  /** Held until the transaction ends: two lists of one system cannot be replaced at once. */
  lock: async (systemId: string): Promise<void> => {
    await db
      .select({ id: systemHeads.systemId })
      .from(systemHeads)
      .where(eq(systemHeads.systemId, systemId))
      .for('update')
  },

  /** Who stays keeps the day they came. */
  apply: async (systemId: string, moves: readonly MembershipMove[]): Promise<void> => {
    const gone = moves.flatMap(({ user, after }) => (after === null ? [user] : []))
    const left = and(eq(memberships.systemId, systemId), inArray(memberships.userId, gone))
    if (gone.length > 0) await db.delete(memberships).where(left)
    const put = moves.flatMap(({ user, after: role }) =>
      role === null ? [] : [{ systemId, userId: user, role }],
    )
    if (put.length === 0) return
    await db
      .insert(memberships)
      .values(put)
      .onDuplicateKeyUpdate({
        set: {
          role: sql`values(${sql.identifier(memberships.role.name)})`,
          version: sql`${sql.identifier(memberships.version.name)} + 1`,
        },
      })
  },
})
