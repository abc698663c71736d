import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import type { JobFound } from './jobs.repository.ts'

/** A job as anybody who may know of it sees it: one whose process is gone has failed. */
export function presentJob(job: JobFound, problem: JobWire['problem']): JobWire {
  const { id, kind, progress, result, createdAt, finishedAt, leaseEndsAt, isAbandoned } = job
  const endedAt = isAbandoned ? leaseEndsAt : finishedAt
  const shown = {
    id,
    kind,
    state: isAbandoned ? 'failed' : job.state,
    progress,
    ...(result === null ? {} : { result: JSON.parse(result) as unknown }),
    ...(problem === undefined ? {} : { problem }),
    createdAt: createdAt.toISOString(),
    finishedAt: endedAt === null ? null : endedAt.toISOString(),
  }
  // Its kind says what its result is: the work of that kind gave it.
  return shown as JobWire
}
