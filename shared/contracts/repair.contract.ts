import * as z from 'zod'
import { dtcgColorSchema, slugSchema, stateSchema, systemParams } from './fields.ts'
import { countsSchema, findingSchema, hexSchema, ratioSchema, verdictSchema } from './findings.ts'
import { WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

const budgetSchema = (most: number, fallback: number) =>
  z.int().min(100).max(most).default(fallback).meta({
    description: 'Colours tried, at most',
    minimum: 100,
    maximum: most,
    default: fallback,
  })

/** A colour to be set in a place; nothing is written by asking. */
export const placedColorSchema = z
  .strictObject({
    token: z.string(),
    theme: slugSchema,
    state: stateSchema,
    source: z
      .boolean()
      .meta({ description: 'Whether this is the value of the token, no override' }),
    color: dtcgColorSchema.meta({ description: 'In OKLCH, unrounded' }),
    hex: hexSchema,
    deltaEOk: z.number().meta({
      description: 'The largest difference over themes and states, as both ship',
    }),
  })
  .meta({ id: 'PlacedColor' })

const requirementSchema = z.strictObject({
  asks: z.enum(['finding', 'theme-span', 'distinct-set']),
  foreground: z.string().optional(),
  background: z.string().optional(),
  theme: slugSchema.optional(),
  state: z.string().optional(),
  required: z.number().optional(),
  fingerprint: z.string().optional(),
  lightness: z
    .array(z.strictObject({ from: z.number(), to: z.number() }))
    .meta({ description: 'OKLCH lightness at which it is met, at the present chroma and hue' }),
})

export const conflictSchema = z
  .strictObject({
    requirements: z.array(requirementSchema),
    bound: z.strictObject({ needed: z.number(), available: ratioSchema }).optional().meta({
      description:
        'Of two with the colour between: the ratios multiplied, and what the other sides have to each other',
    }),
  })
  .meta({ id: 'Conflict', description: 'The fewest requirements that no colour of the hue meets' })

const placedExample = {
  token: 'action.board.fill',
  theme: 'light',
  state: 'rest',
  source: true,
  color: { colorSpace: 'oklch', components: [0.551, 0.128, 243], alpha: 1 },
  hex: '#1478b6',
  deltaEOk: 0.034,
} as const

export const nearestPassing = defineContract({
  operationId: 'nearestPassing',
  method: 'POST',
  path: '/v1/systems/{system}/tokens/{name}/nearest-passing',
  feature: 'repair',
  summary: 'The least change of colour after which every finding that hangs on a token passes',
  description:
    'Hue and alpha are kept, locked tokens stay. Cheapest first: an override in the breaching theme, the source, an override a theme, the other side of the pairs. Nothing is written.',
  params: systemParams.extend({
    name: z.string().min(1).max(255).meta({ example: 'action.board.fill' }),
  }),
  body: z.strictObject({ budget: budgetSchema(50_000, 8000) }).meta({ id: 'AskNearestPassing' }),
  bodyExample: {},
  success: {
    status: 200,
    body: z
      .strictObject({
        outcome: z.enum(['passing', 'found', 'none', 'locked']),
        edits: z.array(placedColorSchema),
        side: z.enum(['own', 'other']).optional().meta({ description: 'Whose colour moves' }),
        breaches: z.array(findingSchema),
        conflict: conflictSchema.optional(),
        evaluations: z.int(),
        stopped: z.boolean().meta({ description: 'Whether the budget ran out' }),
      })
      .meta({ id: 'NearestPassing' }),
    example: {
      outcome: 'found',
      edits: [placedExample],
      side: 'own',
      breaches: [],
      evaluations: 512,
      stopped: false,
    },
  },
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
    'Checked in full before it is answered. Says what it leaves, and why. Nothing is written.',
  params: systemParams,
  body: z.strictObject({ budget: budgetSchema(200_000, 40_000) }).meta({ id: 'AskRepairPlan' }),
  bodyExample: {},
  success: {
    status: 200,
    body: z
      .strictObject({
        edits: z.array(
          placedColorSchema.extend({
            mends: z.array(z.string()).meta({ description: 'Fingerprints of breaches' }),
          }),
        ),
        left: z.array(
          z.strictObject({
            finding: findingSchema,
            reason: z.enum(['locked', 'conflict', 'budget']),
            conflict: conflictSchema.optional(),
          }),
        ),
        breachesBefore: z.int().meta({ description: 'Gating ones' }),
        after: z.strictObject({ verdict: verdictSchema, counts: countsSchema }),
        evaluations: z.int(),
        stopped: z.boolean().meta({ description: 'Whether the budget ran out' }),
      })
      .meta({ id: 'RepairPlan' }),
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
  problems: WRITE_PROBLEMS,
  access: 'tokens:read',
})
