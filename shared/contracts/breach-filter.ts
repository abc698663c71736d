import * as z from 'zod'
import { CONTRAST_KINDS } from '#shared/checks/model.ts'
import { momentSchema, slugSchema } from './fields.ts'
import { useSchema } from './findings.ts'

export const BREACH_STATUSES = ['open', 'waived', 'resolved'] as const
export const BREACH_SORTS = [
  'first-seen',
  '-first-seen',
  'shortfall',
  'ratio',
  'lowest-ratio',
  '-resolved',
  'number',
] as const

export const breachStatusSchema = z.enum(BREACH_STATUSES).meta({ id: 'BreachStatus' })
export const contrastKindSchema = z.enum(CONTRAST_KINDS).meta({ id: 'ContrastKind' })

const NAME = z.string().max(255).optional()

/** What of the log is asked for: every member that is given narrows it. */
export const breachFilter = z.strictObject({
  status: z
    .preprocess(
      (value) => (value === undefined || Array.isArray(value) ? value : [value]),
      z.array(breachStatusSchema).max(3).optional(),
    )
    .meta({
      type: 'array',
      items: { type: 'string', enum: [...BREACH_STATUSES] },
      description: 'May be repeated; absent: open and waived',
    }),
  theme: slugSchema.optional(),
  kind: contrastKindSchema.optional(),
  use: useSchema.optional(),
  token: NAME.meta({ description: 'On either side' }),
  foreground: NAME.meta({ description: 'With background: one pair' }),
  background: NAME,
  assignee: z
    .string()
    .max(64)
    .optional()
    .meta({ description: "A person's id, `me`, or `none`", example: 'none' }),
  since: momentSchema.optional().meta({ description: 'First seen then or later' }),
  before: momentSchema.optional().meta({ description: 'First seen earlier' }),
  origin: z.enum(['head', 'ci']).optional(),
  repository: NAME,
  branch: NAME,
  q: z
    .string()
    .trim()
    .min(1)
    .max(120)
    .optional()
    .meta({ description: 'Part of a token name, or a number of the log' }),
  sort: z.enum(BREACH_SORTS).default('first-seen').meta({
    description:
      'shortfall: the least part of what is required first. -resolved: resolved last first',
  }),
})
export type BreachFilterQuery = z.output<typeof breachFilter>
