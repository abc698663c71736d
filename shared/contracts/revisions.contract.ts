import * as z from 'zod'
import {
  cursorSchema,
  derivedStateSchema,
  idSchema,
  instantSchema,
  levelSchema,
  limitSchema,
  personSchema,
  systemParams,
  themeValuesSchema,
  tokenNameSchema,
  valueSchema,
  wholeNumberSchema,
} from './fields.ts'
import { countsSchema, engineSchema, verdictSchema } from './findings.ts'
import { distinctSetSchema } from './distinct-sets.contract.ts'
import { pairSchema } from './pairs.contract.ts'
import { READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'
import { prefixRulesSchema, ruleScopeSchema, stateRulesSchema } from './rules.contract.ts'
import { themeSchema } from './themes.contract.ts'
import { deprecationSchema } from './tokens.contract.ts'

const summary = {
  number: z.int().min(0),
  at: instantSchema,
  author: z.union([personSchema, z.null()]),
  message: z.string().optional(),
  origin: z.enum(['created', 'direct', 'import', 'change', 'revert']),
  verdict: verdictSchema,
  counts: countsSchema,
  engine: engineSchema,
  digest: z.string().meta({ description: 'SHA-256 of the state, hexadecimal' }),
}

export const revisionSummarySchema = z.strictObject(summary).meta({ id: 'RevisionSummary' })

export const revisionSchema = z
  .strictObject({
    ...summary,
    edits: z.array(
      z.strictObject({
        item: z.enum(['token', 'pair', 'theme', 'rules', 'settings', 'distinct-set', 'other']),
        operation: z.enum(['added', 'edited', 'removed']),
        id: idSchema,
        name: z.string(),
      }),
    ),
    settings: z.strictObject({
      level: levelSchema,
      p3: z.boolean(),
      p3Gates: z.boolean(),
      disabledFloor: z
        .number()
        .nullable()
        .meta({ type: ['number', 'null'] }),
    }),
    states: stateRulesSchema,
    prefixes: z.array(prefixRulesSchema),
    themes: z.array(themeSchema.omit({ etag: true, values: true })),
    tokens: z.array(
      z.strictObject({
        id: idSchema,
        name: tokenNameSchema,
        description: z.string().optional(),
        value: valueSchema,
        states: z.array(derivedStateSchema),
        values: themeValuesSchema,
        rules: ruleScopeSchema.optional(),
        locked: z.boolean(),
        deprecated: deprecationSchema.optional(),
      }),
    ),
    pairs: z.array(pairSchema.omit({ etag: true })),
    distinctSets: z.array(distinctSetSchema.omit({ etag: true })),
    other: z
      .record(z.string(), z.unknown())
      .optional()
      .meta({ description: 'What files brought that is not governed, verbatim; absent: nothing' }),
  })
  .meta({ id: 'Revision', description: 'A system as it stood, whole' })

const summaryExample = {
  number: 214,
  at: '2026-11-24T09:12:00.000Z',
  author: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
  message: 'Lighter board button',
  origin: 'direct',
  verdict: 'fail',
  counts: { pass: 1480, breach: 2, waived: 0, exempt: 96, known: 0 },
  engine: {
    version: '1.0.0',
    gamutMap: 'css-color-4-binary-search-local-minde',
    ruleSet: 'wcag-2.2',
  },
  digest: 'b5bb9d8014a0f9b1d61e21e796d78dccdf1352f23cd32812f4850b878ae4944c',
} as const

export const listRevisions = defineContract({
  operationId: 'listRevisions',
  method: 'GET',
  path: '/v1/systems/{system}/revisions',
  feature: 'revisions',
  summary: 'The revisions, newest first',
  params: systemParams,
  query: z.strictObject({ limit: limitSchema(200, 50), cursor: cursorSchema }),
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(revisionSummarySchema) }),
    example: { items: [summaryExample] },
  },
  problems: READ_PROBLEMS,
  access: 'revisions:read',
  conditional: true,
})

export const getRevision = defineContract({
  operationId: 'getRevision',
  method: 'GET',
  path: '/v1/systems/{system}/revisions/{number}',
  feature: 'revisions',
  summary: 'One revision, whole',
  params: systemParams.extend({
    number: wholeNumberSchema(0, 4_294_967_294).meta({ type: 'integer' }),
  }),
  success: {
    status: 200,
    body: revisionSchema,
    example: {
      ...summaryExample,
      edits: [
        { item: 'token', operation: 'edited', id: 'tok_01jd5w7k2m', name: 'action.board.fill' },
      ],
      settings: { level: 'AA', p3: true, p3Gates: true, disabledFloor: null },
      states: { hover: { lightness: 0.05 } },
      prefixes: [],
      themes: [],
      tokens: [],
      pairs: [],
      distinctSets: [],
    },
  },
  problems: READ_PROBLEMS,
  access: 'revisions:read',
  conditional: true,
})
