import { and, desc, eq, getTableColumns, lt, or } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { checks } from '#drizzle/schema/checks.ts'
import { apiKeys } from '#drizzle/schema/keys.ts'
import { users } from '#drizzle/schema/users.ts'

export interface CheckFilter {
  readonly verdict?: 'pass' | 'fail' | undefined
  readonly repository?: string | undefined
  readonly branch?: string | undefined
  /** Id of a person or a key. */
  readonly caller?: string | undefined
  /** Only what this key asked for. */
  readonly callerKeyId?: string | undefined
}

export interface CheckPage {
  /** Number of the last check of the page before. */
  readonly before: number | undefined
  readonly limit: number
}

export type ChecksReads = ReturnType<typeof createChecksReads>

const { findingsGzip, ...summaryColumns } = getTableColumns(checks)
const callerColumns = {
  user: { id: users.id, name: users.name },
  key: { id: apiKeys.id, name: apiKeys.name },
}

/** Reads kept checks, newest first. */
export function createChecksReads(db: Executor) {
  const withCaller = () =>
    db
      .select({ ...summaryColumns, ...callerColumns })
      .from(checks)
      .leftJoin(users, eq(users.id, checks.callerUserId))
      .leftJoin(apiKeys, eq(apiKeys.id, checks.callerKeyId))
  const one = (systemId: string, id: string) =>
    and(eq(checks.systemId, systemId), eq(checks.id, id))
  return {
    list(systemId: string, filter: CheckFilter, page: CheckPage) {
      const { verdict, repository, branch, caller, callerKeyId } = filter
      return withCaller()
        .where(
          and(
            eq(checks.systemId, systemId),
            verdict === undefined ? undefined : eq(checks.verdict, verdict),
            repository === undefined ? undefined : eq(checks.repository, repository),
            branch === undefined ? undefined : eq(checks.branch, branch),
            caller === undefined
              ? undefined
              : or(eq(checks.callerUserId, caller), eq(checks.callerKeyId, caller)),
            callerKeyId === undefined ? undefined : eq(checks.callerKeyId, callerKeyId),
            page.before === undefined ? undefined : lt(checks.number, page.before),
          ),
        )
        .orderBy(desc(checks.number))
        .limit(page.limit)
    },

    async find(systemId: string, id: string): Promise<CheckSummaryRow | undefined> {
      const [row] = await withCaller().where(one(systemId, id))
      return row
    },

    async findFindings(systemId: string, id: string): Promise<Buffer | undefined> {
      const [row] = await db.select({ findingsGzip }).from(checks).where(one(systemId, id))
      return row?.findingsGzip
    },
  }
}

export type CheckSummaryRow = Omit<typeof checks.$inferSelect, 'findingsGzip'> & {
  readonly user: { readonly id: string; readonly name: string } | null
  readonly key: { readonly id: string; readonly name: string } | null
}
