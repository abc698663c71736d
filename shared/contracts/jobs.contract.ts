import * as z from 'zod'
import { idSchema, instantSchema, systemParams } from './fields.ts'
import { importSchema } from './import-outcome.ts'
import { problemSchema, READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

/** Work that can outlast its request. */
export const JOB_KINDS = ['import', 'repair-plan', 'check'] as const

const tokensDone = z.int().min(0)

export const jobProgressSchema = z
  .strictObject({
    total: tokensDone.meta({ description: 'Tokens that the work is about' }),
    read: tokensDone,
    resolved: tokensDone,
    measured: tokensDone,
  })
  .meta({ id: 'JobProgress', description: 'How far it is, in tokens' })

export const jobSchema = z
  .strictObject({
    id: idSchema,
    kind: z.enum(JOB_KINDS),
    state: z.enum(['running', 'done', 'failed']),
    progress: jobProgressSchema,
    result: importSchema.optional().meta({
      description: 'Once it is done: what would have been answered at once',
    }),
    problem: problemSchema.optional().meta({
      description: 'Where it failed: the refusal that would have been answered; nothing was done',
    }),
    createdAt: instantSchema,
    finishedAt: z.union([instantSchema, z.null()]),
  })
  .meta({ id: 'Job', description: 'Long work and how far it is. It is kept for 7 days' })
export type JobWire = z.infer<typeof jobSchema>

export const jobExample = {
  id: 'job_01jd5w7k2m',
  kind: 'import',
  state: 'running',
  progress: { total: 20_000, read: 20_000, resolved: 0, measured: 0 },
  createdAt: '2026-11-24T09:12:00.000Z',
  finishedAt: null,
} as const

export const getJob = defineContract({
  operationId: 'getJob',
  method: 'GET',
  path: '/v1/systems/{system}/jobs/{id}',
  feature: 'jobs',
  summary: 'How far long work is, and what came of it',
  description:
    'Work goes on whether or not anybody asks. Work whose process ended before it was done has failed, and did nothing. A key reads the jobs it started itself.',
  params: systemParams.extend({ id: idSchema }),
  success: { status: 200, body: jobSchema, example: jobExample },
  problems: READ_PROBLEMS,
  access: 'jobs:read',
  conditional: true,
})
