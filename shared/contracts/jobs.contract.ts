import * as z from 'zod'
import { idSchema, instantSchema, systemParams } from './fields.ts'
import { importSchema } from './import-outcome.ts'
import { problemSchema, READ_PROBLEMS } from './problems.ts'
import { nearestPassingSchema, repairPlanSchema } from './repair-outcome.ts'
import { defineContract } from './route.ts'

const tokensDone = z.int().min(0)

export const jobProgressSchema = z
  .strictObject({
    total: tokensDone.meta({ description: 'Tokens that the work is about' }),
    read: tokensDone,
    resolved: tokensDone,
    measured: tokensDone,
    evaluations: z.int().min(0).optional().meta({ description: 'Of a search: colours tried' }),
    budget: z.int().min(0).optional().meta({ description: 'Of a search: the most it may try' }),
  })
  .meta({ id: 'JobProgress', description: 'How far it is, in tokens; a search also in colours' })

const job = {
  id: idSchema,
  state: z.enum(['running', 'done', 'failed']),
  progress: jobProgressSchema,
  problem: problemSchema.optional().meta({
    description: 'Where it failed: the refusal that would have been answered; nothing was done',
  }),
  createdAt: instantSchema,
  finishedAt: z.union([instantSchema, z.null()]),
}
const resultOf = <Outcome extends z.ZodType>(outcome: Outcome) =>
  outcome.optional().meta({
    description: 'Once it is done: what would have been answered at once',
  })

export const jobSchema = z
  .discriminatedUnion('kind', [
    z.strictObject({ ...job, kind: z.literal('import'), result: resultOf(importSchema) }),
    z.strictObject({ ...job, kind: z.literal('repair-plan'), result: resultOf(repairPlanSchema) }),
    z.strictObject({
      ...job,
      kind: z.literal('nearest-passing'),
      result: resultOf(nearestPassingSchema),
    }),
  ])
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
