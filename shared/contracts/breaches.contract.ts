import * as z from 'zod'
import { breachFilter, breachStatusSchema, contrastKindSchema } from './breach-filter.ts'
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
import { basisSchema, hexSchema, pairStateSchema, ratioSchema, useSchema } from './findings.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const CLOSING_REASONS = [
  'fixed',
  'requirement-changed',
  'pair-removed',
  'theme-removed',
  'exempted',
  'engine-changed',
] as const
/** What checks make of a breach. */
const MEASURED_EVENTS = ['opened', 'worsened', 'eased', 'resolved', 'reopened'] as const
/** What people make of it: its measures stay as they are. */
const HANDLING_EVENTS = ['assigned', 'unassigned', 'commented'] as const
export const BREACH_EVENTS = [...MEASURED_EVENTS, ...HANDLING_EVENTS] as const
export const MOST_COMMENT_CHARACTERS = 4000

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
    use: useSchema.meta({ description: 'As measured last; no part of the identity' }),
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
      .meta({ description: 'null while a breach of the head lasts; in CI by the last check' }),
    resolvedAt: instantSchema.optional(),
    closingReason: z.enum(CLOSING_REASONS).optional(),
    metBy: z
      .strictObject({ foreground: z.string(), background: z.string() })
      .optional()
      .meta({ description: 'The pair of its anyOf group that met the requirement in its place' }),
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
    ratio: ratioSchema.meta({ description: 'As it stood then' }),
    required: z.number(),
    revision: z.int().optional(),
    message: z.string().optional().meta({ description: 'Of the revision that caused it' }),
    check: idSchema.optional(),
    assignee: personSchema
      .optional()
      .meta({ description: 'Whom an assignment names, or has taken off' }),
    body: z.string().optional().meta({ description: 'Of a comment: plain text' }),
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
  use: 'text',
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

const eventExample = {
  id: 'bev_01jd5w7k2m',
  kind: 'opened',
  at: '2026-11-27T10:02:11.481Z',
  ratio: 3.8804,
  required: 4.5,
  revision: 212,
  message: 'Lighter board button',
  actor: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
} as const

export const listBreaches = defineContract({
  operationId: 'listBreaches',
  method: 'GET',
  path: '/v1/systems/{system}/breaches',
  feature: 'breaches',
  summary: 'The breach log: every breach ever, open and waived ones first asked for',
  params: systemParams,
  query: breachFilter.extend({ limit: limitSchema(200, 50), cursor: cursorSchema }),
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

export const exportBreaches = defineContract({
  operationId: 'exportBreaches',
  method: 'GET',
  path: '/v1/systems/{system}/breaches.csv',
  feature: 'breaches',
  summary: 'The breach log as a table for a spreadsheet',
  description:
    'The filters of the list, without pages. Text that a spreadsheet would take for a formula begins with an apostrophe; ratios are cut to four decimals.',
  params: systemParams,
  query: breachFilter,
  success: {
    status: 200,
    media: ['text/csv; charset=utf-8; header=present'],
    body: z.string(),
    example:
      'number,status,foreground,background,theme,state,ratio,required\r\n39,open,action.board.text,action.board.fill,light,rest/rest,3.8804,4.5\r\n',
  },
  problems: READ_PROBLEMS,
  access: 'breaches:read',
  conditional: true,
})

const breachWithEvents = breachSchema.extend({
  events: z.array(breachEventSchema).meta({ description: 'Oldest first' }),
})
export type BreachWithEvents = z.infer<typeof breachWithEvents>

const breachParams = systemParams.extend({ id: idSchema })

export const getBreach = defineContract({
  operationId: 'getBreach',
  method: 'GET',
  path: '/v1/systems/{system}/breaches/{id}',
  feature: 'breaches',
  summary: 'One breach with its history and comments',
  params: breachParams,
  success: {
    status: 200,
    body: breachWithEvents,
    example: { ...breachExample, events: [eventExample] },
  },
  problems: READ_PROBLEMS,
  access: 'breaches:read',
  conditional: true,
})

export const patchBreachBody = z
  .strictObject({
    assignee: z
      .union([idSchema, z.null()])
      .meta({ description: 'A member of the system; null: nobody' }),
  })
  .meta({ id: 'PatchBreach' })

export const patchBreach = defineContract({
  operationId: 'patchBreach',
  method: 'PATCH',
  path: '/v1/systems/{system}/breaches/{id}',
  feature: 'breaches',
  summary: 'Says who is on a breach',
  description: 'Its status is not for anybody to set: only a check resolves a breach.',
  params: breachParams,
  body: patchBreachBody,
  bodyExample: { assignee: 'usr_01jd5w7k2m' },
  success: {
    status: 200,
    body: breachWithEvents,
    example: {
      ...breachExample,
      assignee: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
      events: [eventExample],
    },
  },
  problems: [...WRITE_PROBLEMS, 'precondition-required', 'precondition-failed'],
  access: 'breaches:assign',
  precondition: 'required',
})

export const createBreachCommentBody = z
  .strictObject({
    body: z
      .string()
      .trim()
      .min(1)
      .max(MOST_COMMENT_CHARACTERS)
      .meta({ description: 'Plain text: nothing in it is interpreted' }),
  })
  .meta({ id: 'CreateBreachComment' })

export const createBreachComment = defineContract({
  operationId: 'createBreachComment',
  method: 'POST',
  path: '/v1/systems/{system}/breaches/{id}/comments',
  feature: 'breaches',
  summary: 'Adds a comment to the history of a breach',
  params: breachParams,
  body: createBreachCommentBody,
  bodyExample: { body: 'The new lamp ships in 3.3.0.' },
  success: {
    status: 201,
    body: breachEventSchema,
    example: {
      ...eventExample,
      kind: 'commented',
      revision: undefined,
      message: undefined,
      body: 'The new lamp ships in 3.3.0.',
    },
  },
  problems: WRITE_PROBLEMS,
  access: 'breaches:comment',
})
