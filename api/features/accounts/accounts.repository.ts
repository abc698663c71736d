import { and, eq, isNull, like } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { users } from '#drizzle/schema/users.ts'

export interface AccountRow {
  readonly id: string
  readonly email: string
  readonly name: string
  readonly passwordHash: string
  readonly isAdmin: boolean
}

export const createAccountsRepository = (db: Executor) => ({
  /** The active account of this address, spelled as it is kept. */
  findByEmail: async (email: string): Promise<AccountRow | undefined> => {
    const [row] = await db
      .select({
        id: users.id,
        email: users.email,
        name: users.name,
        passwordHash: users.passwordHash,
        isAdmin: users.isAdmin,
      })
      .from(users)
      .where(and(eq(users.email, email), isNull(users.deactivatedAt)))
    return row
  },

  insert: async (account: AccountRow): Promise<void> => {
    await db.insert(users).values(account)
  },

  /** Active accounts whose address ends so. */
  countByDomain: (domain: string): Promise<number> =>
    db.$count(users, and(like(users.email, `%@%${domain}`), isNull(users.deactivatedAt))),
})
