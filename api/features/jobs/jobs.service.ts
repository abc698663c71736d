import type { Caller, SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { failureOf } from '#api/platform/database-error.ts'
import { afterCommit, outsideEnclosing } from '#api/platform/enclosing-transaction.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Logger } from '#api/platform/logger.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import { type Fault, type Problem, type ProblemCode, PROBLEMS } from '#shared/contracts/problems.ts'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import { presentJob } from './jobs.presenter.ts'
import type { JobFailure, JobFound, JobProgress, NewJobRow } from './jobs.repository.ts'

/** Long work that somebody asked for. */
export interface JobRequest {
  readonly system: SystemAccess
  readonly kind: NewJobRow['kind']
  readonly requestId: string
  /** Tokens that the work is about. */
  readonly total: number
  /** Work that writes nothing holds no transaction while it goes on. */
  readonly isReadOnly?: boolean
}

/** Says how far the work is, and lets whatever else waits in this process have its turn. */
export type Report = (progress: Partial<JobProgress>) => Promise<void>

export interface JobsDeps {
  readonly transact: Transact<'jobs'>
  readonly reads: Pick<Repositories, 'jobs'>
  /** Runs the work inside one transaction with what it leads to: both are committed, or neither. */
  readonly enclosed: (work: (within: Pick<Repositories, 'jobs'>) => Promise<void>) => Promise<void>
  readonly newId: NewId
  readonly logger: Logger
  /** The problem document of a refusal. */
  readonly problemOf: (refusal: AppError, requestId: string) => Problem
}

export type JobsService = ReturnType<typeof createJobsService>

const LEASE_OVER = 'It was held up for longer than its lease'
const SIGN_OF_LIFE_MS = 20_000

/** Work that goes on when its request has been answered. */
export function createJobsService(deps: JobsDeps) {
  const { transact, reads, newId } = deps
  return {
    /** Takes work on: it starts once the job is committed. */
    async start(
      { system, kind, requestId, total, isReadOnly = false }: JobRequest,
      work: (report: Report) => Promise<object>,
    ): Promise<JobWire> {
      const id = newId('job')
      const progress: JobProgress = { total, read: 0, resolved: 0, measured: 0 }
      const row = { id, systemId: system.id, kind, requestId, progress, ...callerOf(system.caller) }
      const found = await transact(async ({ jobs }) => {
        await jobs.purge()
        await jobs.insert(row)
        return jobs.find(system.id, id)
      })
      if (found === undefined) throw new TypeError('A job that was inserted is there')
      afterCommit(() => void run(deps, { id, requestId, progress, isReadOnly }, work))
      return presentJob(found, problemIn(deps, found))
    },

    async get(system: SystemAccess, id: string): Promise<JobWire> {
      const found = await reads.jobs.find(system.id, id)
      if (found === undefined || !maySee(system, found)) {
        throw new AppError('not-found', { detail: `No job ${id}` })
      }
      return presentJob(found, problemIn(deps, found))
    },
  }
}

/** As it was kept: the codes of an earlier release are still codes. */
function problemIn({ problemOf }: JobsDeps, job: JobFound): Problem | undefined {
  const { isAbandoned, failure, requestId } = job
  if (isAbandoned) return problemOf(lost('The process that worked on it is gone'), requestId)
  if (failure === null) return undefined
  const { code, faults, ...options } = failure
  const refusal = new AppError(code as ProblemCode, {
    ...options,
    ...(faults === undefined ? {} : { faults: faults as readonly Fault[] }),
  })
  return problemOf(refusal, requestId)
}

/** Another process may have told that the work failed: then it must have. */
const lost = (detail: string) => new AppError('job-interrupted', { detail })

const callerOf = (caller: Caller) => ({
  callerUserId: caller.kind === 'user' ? caller.userId : null,
  callerKeyId: caller.kind === 'key' ? caller.keyId : null,
})

const maySee = ({ ownOnly, caller }: SystemAccess, { callerKeyId }: JobFound): boolean =>
  !ownOnly || (caller.kind === 'key' && callerKeyId === caller.keyId)

interface Running {
  readonly id: string
  readonly requestId: string
  readonly isReadOnly: boolean
  progress: JobProgress
}

async function run(
  deps: JobsDeps,
  job: Running,
  work: (report: Report) => Promise<object>,
): Promise<void> {
  const { reads, logger } = deps
  const sign = setInterval(() => void keepAlive(deps, job), SIGN_OF_LIFE_MS)
  sign.unref()
  const report: Report = async (progress) => {
    job.progress = { ...job.progress, ...progress }
    // How far it is must show at once, not when all of it is committed.
    if (!(await outsideEnclosing(() => reads.jobs.renew(job.id, job.progress))))
      throw lost(LEASE_OVER)
    await new Promise((resolve) => setImmediate(resolve))
  }
  try {
    const workThenFinish = async ({ jobs }: Pick<Repositories, 'jobs'>) => {
      const result = JSON.stringify(await work(report))
      clearInterval(sign)
      if (!(await jobs.finish(job.id, result, job.progress))) throw lost(LEASE_OVER)
    }
    await (job.isReadOnly ? workThenFinish(reads) : deps.enclosed(workThenFinish))
  } catch (error) {
    const refusal = refusalOf(error)
    if (PROBLEMS[refusal.code].status >= 500) {
      logger.error(
        { requestId: job.requestId, err: refusal.options.cause ?? refusal },
        'job failed',
      )
    }
    await giveUp(deps, job, refusal)
  } finally {
    clearInterval(sign)
  }
}

async function keepAlive({ reads, logger }: JobsDeps, job: Running): Promise<void> {
  try {
    await reads.jobs.renew(job.id, job.progress)
  } catch (error) {
    logger.warn({ requestId: job.requestId, err: failureOf(error) }, 'job lease not renewed')
  }
}

/** Where even this cannot be written, the end of the lease says it. */
async function giveUp({ reads, logger }: JobsDeps, job: Running, refusal: AppError) {
  const { detail, faults, extra } = refusal.options
  const failure: JobFailure = {
    code: refusal.code,
    ...(detail === undefined ? {} : { detail }),
    ...(faults === undefined ? {} : { faults: faults.slice(0, MOST_FAULTS) }),
    ...(extra === undefined ? {} : { extra }),
  }
  try {
    await reads.jobs.fail(job.id, failure)
  } catch (error) {
    logger.warn({ requestId: job.requestId, err: failureOf(error) }, 'job failure not written')
  }
}

/** No more of them can be told in a problem document. */
const MOST_FAULTS = 1000

function refusalOf(error: unknown): AppError {
  const translated = failureOf(error)
  return translated instanceof AppError
    ? translated
    : new AppError('server-unexpected', { cause: translated })
}
