import * as z from 'zod'
import { defineContract } from './route.ts'

export const getHealth = defineContract({
  operationId: 'getHealth',
  method: 'GET',
  path: '/healthz',
  feature: 'health',
  summary: 'The process runs',
  success: {
    status: 200,
    body: z.strictObject({ status: z.enum(['up']) }),
    example: { status: 'up' },
  },
  problems: [],
  access: 'anyone',
  budget: 'none',
})

export const getReadiness = defineContract({
  operationId: 'getReadiness',
  method: 'GET',
  path: '/readyz',
  feature: 'health',
  summary: 'The service can answer: database reachable, migrated, seeded, not stopping',
  success: {
    status: 200,
    body: z.strictObject({ status: z.enum(['ready']) }),
    example: { status: 'ready' },
  },
  problems: [],
  access: 'anyone',
  budget: 'none',
})
