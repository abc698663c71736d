import { asc, eq, inArray, sql } from 'drizzle-orm'
import { isDuplicate } from '#api/platform/database-error.ts'
import type { Executor } from '#api/platform/database.ts'
import { breaches } from '#drizzle/schema/breaches.ts'
import { STILL_LIVE } from '#drizzle/schema/columns.ts'
import { pairVersions } from '#drizzle/schema/pairs.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import {
  memberships,
  type ProtectedBranch,
  settingVersions,
  systemHeads,
  systems,
} from '#drizzle/schema/systems.ts'
import { themeVersions } from '#drizzle/schema/themes.ts'
import { tokenVersions } from '#drizzle/schema/tokens.ts'
import { users } from '#drizzle/schema/users.ts'

/** What a system is called and how it is written: audited, in no revision. */
export interface SystemHandling {
  readonly name: string
  readonly writeMode: 'direct' | 'review'
  readonly protectedBranches: readonly ProtectedBranch[]
}

const live = (versions: typeof tokenVersions | typeof pairVersions | typeof themeVersions) =>
  sql<number>`(select count(*) from ${versions} where ${versions.systemId} = ${systems.id} and ${versions.toRevision} = ${STILL_LIVE})`

const columns = {
  id: systems.id,
  key: systems.key,
  name: systems.name,
  writeMode: systems.writeMode,
  protectedBranches: systems.protectedBranches,
  settings: settingVersions.definition,
  tokens: live(tokenVersions),
  pairs: live(pairVersions),
  themes: live(themeVersions),
  openBreaches: sql<number>`(select count(*) from ${breaches} where ${breaches.systemId} = ${systems.id} and ${breaches.status} = 'open')`,
  revision: systemHeads.revision,
  at: revisions.at,
  verdict: revisions.verdict,
  authorId: users.id,
  authorName: users.name,
}

export function createSystemsRepository(db: Executor) {
  const select = () =>
    db
      .select(columns)
      .from(systems)
      .innerJoin(systemHeads, eq(systemHeads.systemId, systems.id))
      .innerJoin(
        revisions,
        sql`${revisions.systemId} = ${systems.id} and ${revisions.number} = ${systemHeads.revision}`,
      )
      .innerJoin(
        settingVersions,
        sql`${settingVersions.systemId} = ${systems.id} and ${settingVersions.toRevision} = ${STILL_LIVE}`,
      )
      .leftJoin(users, eq(users.id, revisions.authorUserId))

  return {
    /** Every system with its counts and head, by key. */
    listAll: () => select().orderBy(asc(systems.key)),

    listOfMember: (userId: string) =>
      select()
        .where(
          inArray(
            systems.id,
            db
              .select({ id: memberships.systemId })
              .from(memberships)
              .where(eq(memberships.userId, userId)),
          ),
        )
        .orderBy(asc(systems.key)),

    async find(systemId: string) {
      const [row] = await select().where(eq(systems.id, systemId))
      return row
    },

    /** @returns false where the key is taken */
    async add(row: { id: string; key: string; name: string }): Promise<boolean> {
      try {
        await db.insert(systems).values(row)
        return true
      } catch (error) {
        if (isDuplicate(error, 'systems_key_uq')) return false
        throw error
      }
    },

    async setHandling(systemId: string, handling: Partial<SystemHandling>): Promise<void> {
      await db
        .update(systems)
        .set({ ...handling, version: sql`${systems.version} + 1` })
        .where(eq(systems.id, systemId))
    },
  }
}
