import { and, asc, eq, gt, lte, sql } from 'drizzle-orm'
import type { Executor, RawResult } from '#api/platform/database.ts'
import { jobs } from '#drizzle/schema/jobs.ts'

export type JobRow = typeof jobs.$inferSelect
export type JobProgress = JobRow['progress']
export type JobFailure = NonNullable<JobRow['failure']>
export type NewJobRow = Omit<typeof jobs.$inferInsert, 'leaseEndsAt'>

/** A job as it stands by the database's clock. */
export interface JobFound extends JobRow {
  /** Its process has not moved the lease on: it is gone. */
  readonly isAbandoned: boolean
}

/** Longer than a process may be busy with one step and so late with its next sign of life. */
const LEASE_SECONDS = 120
const KEPT_DAYS = 7
const PURGED_AT_ONCE = 20

const now = sql`utc_timestamp(3)`
const leaseEnd = sql`utc_timestamp(3) + interval ${LEASE_SECONDS} second`

/** A job that this process may still finish: later it has failed for everybody. */
const isHeld = (id: string) =>
  and(eq(jobs.id, id), eq(jobs.state, 'running'), gt(jobs.leaseEndsAt, now))

/** Jobs and their leases; only the database's clock decides whether one is held. */
export function createJobsRepository(db: Executor) {
  return {
    async insert(row: NewJobRow): Promise<void> {
      await db.insert(jobs).values({ ...row, leaseEndsAt: leaseEnd })
    },

    async find(systemId: string, id: string): Promise<JobFound | undefined> {
      const isAbandoned = sql<number>`${jobs.state} = 'running' and ${jobs.leaseEndsAt} <= ${now}`
      const [row] = await db
        .select({ job: jobs, isAbandoned })
        .from(jobs)
        .where(and(eq(jobs.systemId, systemId), eq(jobs.id, id)))
      return row && { ...row.job, isAbandoned: Number(row.isAbandoned) === 1 }
    },

    /** @returns false where the job is lost: its lease ended */
    async renew(id: string, progress: JobProgress): Promise<boolean> {
      const [{ affectedRows }]: RawResult = await db
        .update(jobs)
        .set({ progress, leaseEndsAt: leaseEnd })
        .where(isHeld(id))
      return affectedRows === 1
    },

    /** @returns false where the job is lost: what it did must not be committed */
    async finish(id: string, result: string, progress: JobProgress): Promise<boolean> {
      const [{ affectedRows }]: RawResult = await db
        .update(jobs)
        .set({ state: 'done', result, progress, finishedAt: now })
        .where(isHeld(id))
      return affectedRows === 1
    },

    async fail(id: string, failure: JobFailure): Promise<void> {
      await db
        .update(jobs)
        .set({ state: 'failed', failure, finishedAt: now })
        .where(and(eq(jobs.id, id), eq(jobs.state, 'running')))
    },

    /** Each new job clears away some that are over. */
    async purge(): Promise<void> {
      await db
        .delete(jobs)
        .where(lte(jobs.createdAt, sql`utc_timestamp(3) - interval ${KEPT_DAYS} day`))
        .orderBy(asc(jobs.createdAt))
        .limit(PURGED_AT_ONCE)
    },
  }
}
export type JobsRepository = ReturnType<typeof createJobsRepository>
