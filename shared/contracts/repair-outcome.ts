import * as z from 'zod'
import { dtcgColorSchema, slugSchema, stateSchema } from './fields.ts'
import { countsSchema, findingSchema, hexSchema, ratioSchema, verdictSchema } from './findings.ts'

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

export const placedExample = {
  token: 'action.board.fill',
  theme: 'light',
  state: 'rest',
  source: true,
  color: { colorSpace: 'oklch', components: [0.551, 0.128, 243], alpha: 1 },
  hex: '#1478b6',
  deltaEOk: 0.034,
} as const

export const nearestPassingSchema = z
  .strictObject({
    outcome: z.enum(['passing', 'found', 'none', 'locked']),
    edits: z.array(placedColorSchema),
    side: z.enum(['own', 'other']).optional().meta({ description: 'Whose colour moves' }),
    breaches: z.array(findingSchema),
    conflict: conflictSchema.optional(),
    evaluations: z.int(),
    stopped: z.boolean().meta({ description: 'Whether the budget ran out' }),
  })
  .meta({ id: 'NearestPassing' })

export const repairPlanSchema = z
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
  .meta({ id: 'RepairPlan' })
