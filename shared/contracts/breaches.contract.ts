import * as z from 'zod'
import { CONTRAST_KINDS } from '#shared/checks/model.ts'
import {
  cursorSchema,
  etagSchema,
  idSchema,
  instantSchema,
  limitSchema,
  personSchema,
  slugSchema,
  systemParams,
} from './fields.ts'
import { basisSchema, hexSchema, pairStateSchema, ratioSchema } from './findings.ts'
import { READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const BREACH_STATUSES = ['open', 'waived', 'resolved'] as const
export const CLOSING_REASONS = [
  'fixed',
  'requirement-changed',
  'pair-removed',
  'theme-removed',
  'exempted',
  'engine-changed',
] as const
export const BREACH_EVENTS = ['opened', 'worsened', 'eased', 'resolved', 'reopened'] as const
export const BREACH_SORTS = ['first-seen', '-first-seen', 'shortfall', 'number'] as const

export const breachStatusSchema = z.enum(BREACH_STATUSES).meta({ id: 'BreachStatus' })
export const contrastKindSchema = z.enum(CONTRAST_KINDS).meta({ id: 'ContrastKind' })

export const breachSchema = z
  .strictObject({
    id: idSchema,
    number: z.int().min(1).meta({ description: 'Counts up within the system' }),
    origin: z.enum(['head', 'ci']),
    repository: z.string().optional(),
    branch: z.string().optional(),
    foreground: z.string(),
    background: z.string(),
    kind: contrastKindSchema,
    theme: slugSchema,
    state: pairStateSchema,
    basis: basisSchema,
    status: breachStatusSchema,
    gating: z.boolean(),
    ratio: ratioSchema.meta({ description: 'As measured last' }),
    required: z.number(),
    lowestRatio: ratioSchema,
    rendered: z.strictObject({ foreground: hexSchema, background: hexSchema }),
    firstSeenAt: instantSchema,
    firstSeenRevision: z.int().optional(),
    lastSeenAt: z
      .union([instantSchema, z.null()])
      .meta({ description: 'null while a breach of the head lasts' }),
    resolvedAt: instantSchema.optional(),
    closingReason: z.enum(CLOSING_REASONS).optional(),
    assignee: z.union([personSchema, z.null()]),
    etag: etagSchema,
  })
  .meta({ id: 'Breach', description: 'An entry of the breach log' })
export type BreachWire = z.infer<typeof breachSchema>

export const breachEventSchema = z
  .strictObject({
    id: idSchema,
    kind: z.enum(BREACH_EVENTS),
    at: instantSchema,
    ratio: ratioSchema,
    required: z.number(),
    revision: z.int().optional(),
    message: z.string().optional().meta({ description: 'Of the revision that caused it' }),
    check: idSchema.optional(),
    actor: z.union([personSchema, z.null()]),
  })
  .meta({ id: 'BreachEvent' })
export type BreachEventWire = z.infer<typeof breachEventSchema>

const breachExample = {
  id: 'brc_01jd5w7k2m',
  number: 39,
  origin: 'head',
  foreground: 'action.board.text',
  background: 'action.board.fill',
  kind: 'text',
  theme: 'light',
  state: 'rest/rest',
  basis: 'srgb',
  status: 'open',
  gating: true,
  ratio: 3.8804,
  required: 4.5,
  lowestRatio: 3.8804,
  rendered: { foreground: '#faf8f2', background: '#2283c1' },
  firstSeenAt: '2026-11-27T10:02:11.481Z',
  firstSeenRevision: 212,
  lastSeenAt: null,
  assignee: null,
  etag: '"1f9d"',
} as const

export const listBreaches = defineContract({
  operationId: 'listBreaches',
  method: 'GET',
  path: '/v1/systems/{system}/breaches',
  feature: 'breaches',
  summary: 'The breach log: every breach ever, open and waived ones first asked for',
  params: systemParams,
  query: z.strictObject({
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
    token: z.string().max(255).optional().meta({ description: 'On either side' }),
    origin: z.enum(['head', 'ci']).optional(),
    sort: z.enum(BREACH_SORTS).default('first-seen'),
    limit: limitSchema(200, 50),
    cursor: cursorSchema,
  }),
  success: {
    status: 200,
    body: z.strictObject({
      items: z.array(breachSchema),
      total: z.int().meta({ description: 'Entries that the filter finds' }),
      ever: z.int().meta({ description: 'Entries the log has ever taken' }),
    }),
    example: { items: [breachExample], total: 1, ever: 43 },
  },
  problems: READ_PROBLEMS,
  access: 'breaches:read',
  conditional: true,
})

export const getBreach = defineContract({
  operationId: 'getBreach',
  method: 'GET',
  path: '/v1/systems/{system}/breaches/{id}',
  feature: 'breaches',
  summary: 'One breach with its history',
  params: systemParams.extend({ id: idSchema }),
  success: {
    status: 200,
    body: breachSchema.extend({ events: z.array(breachEventSchema) }),
    example: {
      ...breachExample,
      events: [
        {
          id: 'bev_01jd5w7k2m',
          kind: 'opened',
          at: '2026-11-27T10:02:11.481Z',
          ratio: 3.8804,
          required: 4.5,
          revision: 212,
          message: 'Lighter board button',
          actor: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
        },
      ],
    },
  },
  problems: READ_PROBLEMS,
  access: 'breaches:read',
  conditional: true,
})
