import * as z from 'zod'
import { idSchema, instantSchema, systemParams, tokenNameSchema } from './fields.ts'
import { pairInputSchema } from './pairs.contract.ts'
import { READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const MOST_OBSERVED = 1000

export const coverageSchema = z
  .strictObject({
    tokens: z.int().min(0).meta({ description: 'All there are' }),
    uncovered: z
      .array(z.strictObject({ id: idSchema, name: tokenNameSchema, deprecated: z.boolean() }))
      .meta({ description: 'In no pair, and followed by no token that is' }),
    observed: z
      .array(
        z.strictObject({
          pair: pairInputSchema.meta({ description: 'What would be declared' }),
          missing: z.array(z.string()).meta({ description: 'Its tokens that are not there' }),
          count: z.int().min(1).meta({ description: 'Checks that sent it' }),
          firstSeenAt: instantSchema,
          lastSeenAt: instantSchema,
          repository: z.string().optional().meta({ description: 'Of the check that sent it last' }),
          branch: z.string().optional(),
        }),
      )
      .max(MOST_OBSERVED)
      .meta({ description: 'Sent by pipelines within 30 days and not declared, the latest first' }),
  })
  .meta({ id: 'Coverage', description: 'What nobody measures' })
export type CoverageWire = z.infer<typeof coverageSchema>

export const getCoverage = defineContract({
  operationId: 'getCoverage',
  method: 'GET',
  path: '/v1/systems/{system}/coverage',
  feature: 'coverage',
  summary: 'Tokens in no pair, and pairs that CI measures but nobody declared',
  description:
    'A pair counts as observed where a check was sent with it by a key, or names its source. It counts as declared where a declared one has the same tokens, backdrop, use and relation.',
  params: systemParams,
  success: {
    status: 200,
    body: coverageSchema,
    example: {
      tokens: 117,
      uncovered: [{ id: 'tok_01jd5w7k2m', name: 'chart.grid', deprecated: false }],
      observed: [
        {
          pair: {
            foreground: 'chart.axis',
            background: 'surface.hull',
            use: 'text',
            relation: 'inside',
          },
          missing: [],
          count: 12,
          firstSeenAt: '2026-11-20T08:00:04.120Z',
          lastSeenAt: '2026-11-24T09:12:00.000Z',
          repository: 'larkhaven/timetable',
          branch: 'main',
        },
      ],
    },
  },
  problems: READ_PROBLEMS,
  access: 'pairs:read',
  conditional: true,
})
