import * as z from 'zod'
import { slugSchema, stateSchema, systemParams } from './fields.ts'
import { pairStateSchema, ratioSchema } from './findings.ts'
import { jobExample, jobSchema } from './jobs.contract.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { nearestPassingSchema, placedExample, repairPlanSchema } from './repair-outcome.ts'
import { defineContract } from './route.ts'

const budgetSchema = (most: number, fallback: number) =>
  z.int().min(100).max(most).default(fallback).meta({
    description: 'Colours tried, at most',
    minimum: 100,
    maximum: most,
    default: fallback,
  })

const tokenParams = systemParams.extend({
  name: z.string().min(1).max(255).meta({ example: 'action.board.fill' }),
})

export const nearestPassing = defineContract({
  operationId: 'nearestPassing',
  method: 'POST',
  path: '/v1/systems/{system}/tokens/{name}/nearest-passing',
  feature: 'repair',
  summary: 'The least change of colour after which every finding that hangs on a token passes',
  description:
    'Hue and alpha are kept, locked tokens stay. Cheapest first: an override in the breaching theme, the source, an override a theme, the other side of the pairs. Nothing is written. Long work is answered with 202 and a job.',
  params: tokenParams,
  body: z.strictObject({ budget: budgetSchema(50_000, 8000) }).meta({ id: 'AskNearestPassing' }),
  bodyExample: {},
  success: {
    status: 200,
    body: nearestPassingSchema,
    example: {
      outcome: 'found',
      edits: [placedExample],
      side: 'own',
      breaches: [],
      evaluations: 512,
      stopped: false,
    },
  },
  deferred: { body: jobSchema, example: { ...jobExample, kind: 'nearest-passing' } },
  problems: WRITE_PROBLEMS,
  access: 'tokens:read',
})

export const planRepair = defineContract({
  operationId: 'planRepair',
  method: 'POST',
  path: '/v1/systems/{system}/repair-plan',
  feature: 'repair',
  summary: 'A few changes of colour after which nothing gating breaches, or as little as can be',
  description:
    'Checked in full before it is answered. Says what it leaves, and why. Nothing is written. Long work is answered with 202 and a job.',
  params: systemParams,
  body: z.strictObject({ budget: budgetSchema(200_000, 40_000) }).meta({ id: 'AskRepairPlan' }),
  bodyExample: {},
  success: {
    status: 200,
    body: repairPlanSchema,
    example: {
      edits: [{ ...placedExample, mends: [] }],
      left: [],
      breachesBefore: 2,
      after: {
        verdict: 'pass',
        counts: { pass: 1482, breach: 0, waived: 0, exempt: 96, known: 0 },
      },
      evaluations: 1830,
      stopped: false,
    },
  },
  deferred: { body: jobSchema, example: { ...jobExample, kind: 'repair-plan' } },
  problems: WRITE_PROBLEMS,
  access: 'tokens:read',
})

const standingUseSchema = z.enum(['text', 'large-text', 'non-text'])

export const listUsableOn = defineContract({
  operationId: 'listUsableOn',
  method: 'GET',
  path: '/v1/systems/{system}/tokens/{name}/usable-on',
  feature: 'repair',
  summary: 'Which tokens may stand on this one, and for what',
  description:
    'Measured as a foreground within a container, declared or not, on the ground of each theme. A use is listed where its ratio is reached in every theme and state asked about; disabled ones, of which WCAG asks nothing, are left out. In the order of the ledger.',
  params: tokenParams,
  query: z.strictObject({
    theme: slugSchema.optional().meta({ description: 'In this theme alone' }),
    state: stateSchema
      .optional()
      .meta({ description: 'In this state of either, and at rest; absent: in all of theirs' }),
    use: standingUseSchema.optional().meta({ description: 'Only what may stand for this use' }),
  }),
  success: {
    status: 200,
    body: z.strictObject({
      items: z.array(
        z
          .strictObject({
            token: z.string(),
            uses: z.array(standingUseSchema),
            lowest: z
              .strictObject({ theme: slugSchema, state: pairStateSchema, ratio: ratioSchema })
              .meta({ description: 'Where it has least' }),
          })
          .meta({ id: 'UsableToken' }),
      ),
    }),
    example: {
      items: [
        {
          token: 'text.rope',
          uses: ['large-text', 'non-text'],
          lowest: { theme: 'light', state: 'rest/hover', ratio: 3.8804 },
        },
      ],
    },
  },
  problems: READ_PROBLEMS,
  access: 'tokens:read',
  conditional: true,
})
