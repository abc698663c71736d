import { and, desc, eq, getTableColumns, lt } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { checks } from '#drizzle/schema/checks.ts'

export interface CheckFilter {
  readonly verdict?: 'pass' | 'fail' | undefined
  readonly repository?: string | undefined
  readonly branch?: string | undefined
  /** Only what this key asked for. */
  readonly callerKeyId?: string | undefined
}

export interface CheckPage {
  /** Number of the last check of the page before. */
  readonly before: number | undefined
  readonly limit: number
}

export type ChecksReads = ReturnType<typeof createChecksReads>

const { findingsGzip: _, ...summaryColumns } = getTableColumns(checks)

/** Reads kept checks, newest first. */
export function createChecksReads(db: Executor) {
  return {
    list(systemId: string, filter: CheckFilter, page: CheckPage) {
      const { verdict, repository, branch, callerKeyId } = filter
      return db
        .select(summaryColumns)
        .from(checks)
        .where(
          and(
            eq(checks.systemId, systemId),
            verdict === undefined ? undefined : eq(checks.verdict, verdict),
            repository === undefined ? undefined : eq(checks.repository, repository),
            branch === undefined ? undefined : eq(checks.branch, branch),
            callerKeyId === undefined ? undefined : eq(checks.callerKeyId, callerKeyId),
            page.before === undefined ? undefined : lt(checks.number, page.before),
          ),
        )
        .orderBy(desc(checks.number))
        .limit(page.limit)
    },

    async find(systemId: string, id: string) {
      const [row] = await db
        .select()
        .from(checks)
        .where(and(eq(checks.systemId, systemId), eq(checks.id, id)))
      return row
    },
  }
}

export type CheckSummaryRow = Awaited<ReturnType<ChecksReads['list']>>[number]
