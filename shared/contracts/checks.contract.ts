import * as z from 'zod'
import { sarifOf } from '#shared/formats/sarif.ts'
import { cursorSchema, idSchema, instantSchema, limitSchema, systemParams } from './fields.ts'
import {
  advisorySchema,
  countsSchema,
  distinctMeasureExample,
  distinctMeasureSchema,
  engineSchema,
  findingExample,
  findingSchema,
  verdictSchema,
} from './findings.ts'
import { pairInputSchema } from './pairs.contract.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { conflictSchema, placedColorSchema } from './repair-outcome.ts'
import { defineContract } from './route.ts'
import { sarifLogSchema } from './sarif-log.ts'

/** As code hosts name repositories and branches: in one line. @see https://git-scm.com/docs/git-check-ref-format */
const sourceNameSchema = z
  .string()
  .trim()
  .min(1)
  .max(255)
  .refine((name) => !/\p{Cc}/u.test(name), { message: 'Control characters are in no name' })

export const checkSourceSchema = z
  .strictObject({
    repository: sourceNameSchema.optional(),
    branch: sourceNameSchema.optional(),
    commit: z.string().trim().min(1).max(64).optional(),
    pipelineUrl: z
      .url({ protocol: /^https?$/ })
      .max(2000)
      .optional(),
  })
  .meta({
    id: 'CheckSource',
    example: { repository: 'larkhaven/timetable', branch: 'main', commit: '4be1d02' },
  })

/** A DTCG document; read by shared/formats, which names every fault in it. */
const documentSchema = z
  .record(z.string(), z.unknown())
  .meta({ id: 'TokenDocument', description: 'Design Tokens Format Module 2025.10' })

export const createCheckBody = z
  .strictObject({
    against: z
      .string()
      .regex(/^head$/, 'Only head can be named: nothing has been released')
      .default('head')
      .meta({ description: 'What a candidate is merged over and compared with', example: 'head' }),
    tokens: documentSchema.optional(),
    mode: z
      .enum(['merge', 'replace'])
      .default('merge')
      .meta({ description: 'replace: the document is the whole set of tokens' }),
    pairs: z
      .array(pairInputSchema)
      .max(20_000)
      .optional()
      .meta({ description: 'Added to the declared ones' }),
    newOnly: z
      .boolean()
      .default(false)
      .meta({ description: 'A breach that the compared one has, and is no lower now, is known' }),
    source: checkSourceSchema.optional(),
  })
  .meta({ id: 'CreateCheck' })
export type CreateCheckBody = z.input<typeof createCheckBody>

const callerSchema = z
  .strictObject({ kind: z.enum(['user', 'key']), id: idSchema, name: z.string() })
  .meta({ id: 'CheckCaller', description: 'Who asked: a person, or a key by its own name' })

const loggedSchema = z
  .strictObject({
    protected: z.boolean().meta({
      description: 'Whether the branch is protected: what it has and the head has not is logged',
    }),
    seen: z
      .int()
      .min(0)
      .meta({ description: 'Findings that fall short, also those that the head has' }),
    opened: z.int().min(0).meta({ description: 'Entries of the breach log opened or reopened' }),
    resolved: z.int().min(0).meta({ description: 'Entries of the breach log resolved' }),
  })
  .meta({
    id: 'Logged',
    description: 'What the check left behind; only where its source names repository and branch',
  })

/** A finding of a check, with what was asked for beside it. */
export const checkFindingSchema = findingSchema
  .extend({
    nearest: placedColorSchema.optional().meta({
      description:
        'The nearest colour with which it passes, and all else that hangs on that token, distinct sets not asked; those of one check pass together',
    }),
    unmended: z
      .strictObject({
        reason: z.enum(['locked', 'conflict', 'budget']).meta({
          description:
            'locked: no side of it may move; conflict: no colour of a hue meets all it must; budget: not searched, or not to the end',
        }),
        conflict: conflictSchema.optional(),
      })
      .optional()
      .meta({ description: 'Why there is no nearest colour, where one was asked for' }),
  })
  .meta({ id: 'CheckFinding', description: 'One pair in one theme and state, measured' })
export type CheckFindingWire = z.infer<typeof checkFindingSchema>

const summary = {
  id: idSchema,
  number: z.int().min(1).meta({ description: 'Counts up within the system' }),
  verdict: verdictSchema,
  counts: countsSchema,
  engine: engineSchema,
  against: z.strictObject({ revision: z.int().min(0) }),
  source: checkSourceSchema.optional(),
  logged: loggedSchema.optional(),
  caller: callerSchema,
  at: instantSchema,
}

export const checkSummarySchema = z.strictObject(summary).meta({ id: 'CheckSummary' })

export type CheckSummaryWire = z.infer<typeof checkSummarySchema>

export const checkSchema = z
  .strictObject({
    ...summary,
    findings: z.array(checkFindingSchema),
    advisories: z.array(advisorySchema),
    distinctSets: z
      .array(distinctMeasureSchema)
      .meta({ description: 'Every distinct set in every theme; no part of the verdict' }),
  })
  .meta({ id: 'Check', description: 'One evaluation. A failing check is an answer, not an error.' })
export type CheckWire = z.infer<typeof checkSchema>

const summaryExample = {
  id: 'chk_01jd5w7k2m',
  number: 4413,
  verdict: 'fail',
  counts: { pass: 1480, breach: 1, waived: 0, exempt: 96, known: 0 },
  engine: {
    version: '1.0.0',
    gamutMap: 'css-color-4-binary-search-local-minde',
    ruleSet: 'wcag-2.2',
  },
  against: { revision: 214 },
  source: { repository: 'larkhaven/timetable', branch: 'main', commit: '4be1d02' },
  logged: { protected: true, seen: 1, opened: 1, resolved: 0 },
  caller: { kind: 'key', id: 'key_01jd5w7k2m', name: 'Timetable pipeline' },
  at: '2026-11-24T09:12:00.000Z',
} as const
const checkExample = {
  ...summaryExample,
  findings: [findingExample],
  advisories: [],
  distinctSets: [distinctMeasureExample],
} as const

const alternatives = [
  {
    media: 'application/sarif+json',
    body: sarifLogSchema,
    example: sarifOf(checkExample, 'larkhaven'),
  },
] as const

const findingsQuery = z.strictObject({
  findings: z.enum(['short', 'all']).default('short').meta({ description: 'short: all but pass' }),
  nearest: z
    .enum(['true', 'false'])
    .default('false')
    .transform((text) => text === 'true')
    .meta({
      description:
        'true: each gating breach says the nearest colour with which it passes, or why there is none; the 20 furthest short are searched',
      type: 'string',
      enum: ['true', 'false'],
      default: 'false',
    }),
})

export const createCheck = defineContract({
  operationId: 'createCheck',
  method: 'POST',
  path: '/v1/systems/{system}/checks',
  feature: 'checks',
  summary: 'Measures every pair, of the head or of a candidate, and gives the verdict',
  description:
    'Without tokens and pairs it checks against as it stands. Only an accessibility lead in person may send exempt pairs. Contrast is one criterion; a verdict is no statement of conformity.',
  params: systemParams,
  query: findingsQuery,
  body: createCheckBody,
  maxBodyBytes: 8 * 2 ** 20,
  bodyExample: {
    tokens: {
      action: {
        board: {
          fill: {
            $type: 'color',
            $value: { colorSpace: 'oklch', components: [0.6, 0.128, 243] },
          },
        },
      },
    },
    newOnly: true,
    source: { repository: 'larkhaven/timetable', branch: 'main' },
  },
  success: { status: 200, body: checkSchema, example: checkExample },
  alternatives,
  problems: [...WRITE_PROBLEMS, 'system-unresolvable', 'not-acceptable', 'requests-too-many'],
  access: 'checks:write',
})

export const listChecks = defineContract({
  operationId: 'listChecks',
  method: 'GET',
  path: '/v1/systems/{system}/checks',
  feature: 'checks',
  summary: 'The checks, newest first',
  params: systemParams,
  query: z.strictObject({
    verdict: verdictSchema.optional(),
    repository: z.string().max(255).optional(),
    branch: z.string().max(255).optional(),
    caller: z
      .string()
      .max(64)
      .optional()
      .meta({ description: 'Id of a person or a key', example: 'key_01jd5w7k2m' }),
    limit: limitSchema(200, 50),
    cursor: cursorSchema,
  }),
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(checkSummarySchema) }),
    example: { items: [summaryExample] },
  },
  problems: READ_PROBLEMS,
  access: 'checks:read',
  conditional: true,
})

export const getCheck = defineContract({
  operationId: 'getCheck',
  method: 'GET',
  path: '/v1/systems/{system}/checks/{id}',
  feature: 'checks',
  summary: 'One check with its findings that are not pass',
  description: 'Findings that pass are not kept with a check.',
  params: systemParams.extend({ id: idSchema }),
  success: { status: 200, body: checkSchema, example: checkExample },
  alternatives,
  problems: [...READ_PROBLEMS, 'not-acceptable'],
  access: 'checks:read',
  conditional: true,
})
