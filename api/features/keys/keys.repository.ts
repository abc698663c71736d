import { and, asc, eq, isNull, or, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { apiKeys } from '#drizzle/schema/keys.ts'
import { memberships } from '#drizzle/schema/systems.ts'
import { users } from '#drizzle/schema/users.ts'

export interface NewKey {
  readonly id: string
  readonly systemId: string
  readonly ownerUserId: string
  readonly name: string
  readonly kind: 'read' | 'ci'
  readonly hint: string
  readonly secretHash: string
  readonly scopes: readonly string[]
  readonly days: number
}

export type KeysRepository = ReturnType<typeof createKeysRepository>
export type KeyRow = Awaited<ReturnType<KeysRepository['list']>>[number]

/** In force by the database's clock. */
const inForce = and(isNull(apiKeys.revokedAt), sql`${apiKeys.expiresAt} > utc_timestamp(3)`)

/** What a list shows of a key: never its hash. */
const shownColumns = {
  id: apiKeys.id,
  name: apiKeys.name,
  kind: apiKeys.kind,
  scopes: apiKeys.scopes,
  hint: apiKeys.hint,
  owner: { id: users.id, name: users.name },
  createdAt: apiKeys.createdAt,
  expiresAt: apiKeys.expiresAt,
  lastUsedAt: apiKeys.lastUsedAt,
}

/** When a use is noted: at most once a minute. */
const IS_STALE = sql`coalesce(${apiKeys.lastUsedAt} < utc_timestamp(3) - interval 1 minute, true)`

export const createKeysRepository = (db: Executor) => ({
  insert: async ({ days, ...key }: NewKey): Promise<void> => {
    await db
      .insert(apiKeys)
      .values({ ...key, expiresAt: sql`utc_timestamp(3) + interval ${days} day` })
  },

  list: (systemId: string, only: { id?: string; ownerUserId?: string } = {}) =>
    db
      .select(shownColumns)
      .from(apiKeys)
      .innerJoin(users, eq(users.id, apiKeys.ownerUserId))
      .where(
        and(
          eq(apiKeys.systemId, systemId),
          inForce,
          only.id === undefined ? undefined : eq(apiKeys.id, only.id),
          only.ownerUserId === undefined ? undefined : eq(apiKeys.ownerUserId, only.ownerUserId),
        ),
      )
      .orderBy(asc(apiKeys.createdAt), asc(apiKeys.id)),

  /** A key in force whose owner still belongs to its system. */
  findLive: async (secretHash: string) => {
    const [row] = await db
      .select({
        keyId: apiKeys.id,
        systemId: apiKeys.systemId,
        scopes: apiKeys.scopes,
        userId: users.id,
        name: users.name,
        isStale: sql<number>`${IS_STALE}`,
      })
      .from(apiKeys)
      .innerJoin(users, eq(users.id, apiKeys.ownerUserId))
      .leftJoin(
        memberships,
        and(eq(memberships.userId, users.id), eq(memberships.systemId, apiKeys.systemId)),
      )
      .where(
        and(
          eq(apiKeys.secretHash, secretHash),
          inForce,
          isNull(users.deactivatedAt),
          or(eq(users.isAdmin, true), sql`${memberships.role} is not null`),
        ),
      )
    return row
  },

  /** Asked again by the statement: of requests that come at once one writes. */
  touch: async (id: string): Promise<void> => {
    await db
      .update(apiKeys)
      .set({ lastUsedAt: sql`utc_timestamp(3)` })
      .where(and(eq(apiKeys.id, id), IS_STALE))
  },

  /** @returns false where somebody has revoked it already */
  revoke: async (id: string): Promise<boolean> => {
    const [{ affectedRows }] = await db
      .update(apiKeys)
      .set({ revokedAt: sql`utc_timestamp(3)` })
      .where(and(eq(apiKeys.id, id), isNull(apiKeys.revokedAt)))
    return affectedRows === 1
  },
})
