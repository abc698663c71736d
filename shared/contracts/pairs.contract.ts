import * as z from 'zod'
import { EXEMPTIONS, RELATIONS } from '#shared/checks/model.ts'
import {
  cursorSchema,
  etagSchema,
  idSchema,
  levelSchema,
  limitSchema,
  messageSchema,
  slugSchema,
  stateSchema,
  systemParams,
  tokenNameSchema,
} from './fields.ts'
import { effectExample, effectSchema, useSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS, REVISION_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const exemptSchema = z
  .strictObject({
    kind: z.enum(EXEMPTIONS),
    reason: z.string().trim().min(1).max(500),
  })
  .meta({ id: 'Exemption', example: { kind: 'logotype', reason: 'The line of the brand name' } })

const members = {
  foreground: tokenNameSchema,
  background: tokenNameSchema,
  use: useSchema,
  backdrop: z
    .union([z.array(tokenNameSchema).max(16), z.enum(['unknown'])])
    .optional()
    .meta({ description: 'Tokens at rest, bottom first, on the ground; or unknown' }),
  states: z
    .array(stateSchema)
    .max(5)
    .optional()
    .meta({ description: 'Limits both sides; rest is always in; absent: all' }),
  themes: z.array(slugSchema).min(1).max(8).optional().meta({ description: 'Absent: all' }),
  level: levelSchema.optional(),
  minimum: z
    .number()
    .min(1)
    .max(21)
    .optional()
    .meta({ description: 'A ratio at or above the required one' }),
  anyOf: z.string().trim().min(1).max(120).optional(),
  product: z.string().trim().min(1).max(120).optional(),
  exempt: exemptSchema.optional(),
}
const relationSchema = z.enum(RELATIONS).meta({ id: 'Relation' })

/** A pair as a write, a check's `pairs` and a pairs file give it. */
export const pairInputSchema = z
  .strictObject({ ...members, relation: relationSchema.default('inside') })
  .meta({
    id: 'PairInput',
    example: { foreground: 'action.board.text', background: 'action.board.fill', use: 'text' },
  })
export type PairInput = z.infer<typeof pairInputSchema>

export const pairSchema = z
  .strictObject({ id: idSchema, ...members, relation: relationSchema, etag: etagSchema })
  .meta({ id: 'Pair' })
export type PairWire = z.infer<typeof pairSchema>

export const createPairBody = pairInputSchema.extend({ message: messageSchema }).meta({
  id: 'CreatePair',
})

const nullable = <S extends z.ZodType>(schema: S) => z.union([schema, z.null()]).optional()

export const patchPairBody = z
  .strictObject({
    foreground: members.foreground.optional(),
    background: members.background.optional(),
    use: useSchema.optional(),
    relation: relationSchema.optional(),
    backdrop: nullable(z.union([z.array(tokenNameSchema).max(16), z.enum(['unknown'])])),
    states: nullable(z.array(stateSchema).max(5)),
    themes: nullable(z.array(slugSchema).min(1).max(8)),
    level: nullable(levelSchema),
    minimum: nullable(z.number().min(1).max(21)),
    anyOf: nullable(z.string().trim().min(1).max(120)),
    product: nullable(z.string().trim().min(1).max(120)),
    exempt: nullable(exemptSchema),
    message: messageSchema,
  })
  .meta({ id: 'PatchPair', description: 'Absent members stay, null removes an optional one' })

const pairExample = {
  id: 'pair_01jd5w7k2m',
  foreground: 'action.board.text',
  background: 'action.board.fill',
  use: 'text',
  relation: 'together',
  product: 'timetable',
  etag: '"88f0"',
} as const

const writtenPair = pairSchema.extend({ effect: effectSchema }).meta({ id: 'WrittenPair' })
const pairParams = systemParams.extend({ id: idSchema })

export const listPairs = defineContract({
  operationId: 'listPairs',
  method: 'GET',
  path: '/v1/systems/{system}/pairs',
  feature: 'pairs',
  summary: 'The declared pairs in the order of their declaration',
  params: systemParams,
  query: z.strictObject({
    token: z.string().max(255).optional().meta({ description: 'On either side' }),
    use: useSchema.optional(),
    product: z.string().max(120).optional(),
    limit: limitSchema(500, 100),
    cursor: cursorSchema,
  }),
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(pairSchema) }),
    example: { items: [pairExample] },
  },
  problems: READ_PROBLEMS,
  access: 'pairs:read',
  conditional: true,
})

export const createPair = defineContract({
  operationId: 'createPair',
  method: 'POST',
  path: '/v1/systems/{system}/pairs',
  feature: 'pairs',
  summary: 'Declares a pair; makes one revision',
  description: 'Only an accessibility lead may declare an exemption.',
  params: systemParams,
  body: createPairBody,
  bodyExample: {
    foreground: 'action.board.text',
    background: 'action.board.fill',
    use: 'text',
    relation: 'together',
  },
  success: { status: 201, body: writtenPair, example: { ...pairExample, effect: effectExample } },
  problems: [...REVISION_PROBLEMS, 'pair-already-declared'],
  access: 'pairs:write',
})

export const getPair = defineContract({
  operationId: 'getPair',
  method: 'GET',
  path: '/v1/systems/{system}/pairs/{id}',
  feature: 'pairs',
  summary: 'One declared pair',
  params: pairParams,
  success: { status: 200, body: pairSchema, example: pairExample },
  problems: READ_PROBLEMS,
  access: 'pairs:read',
  conditional: true,
})

export const patchPair = defineContract({
  operationId: 'patchPair',
  method: 'PATCH',
  path: '/v1/systems/{system}/pairs/{id}',
  feature: 'pairs',
  summary: 'Edits a declared pair; makes one revision',
  description: 'An accessibility lead edits exemption and level only.',
  params: pairParams,
  body: patchPairBody,
  bodyExample: { minimum: 7, message: 'Read in glare' },
  success: { status: 200, body: writtenPair, example: { ...pairExample, effect: effectExample } },
  problems: [...EDIT_PROBLEMS, 'pair-already-declared'],
  access: 'pairs:write',
  precondition: 'required',
})

export const deletePair = defineContract({
  operationId: 'deletePair',
  method: 'DELETE',
  path: '/v1/systems/{system}/pairs/{id}',
  feature: 'pairs',
  summary: 'Removes a declared pair; makes one revision',
  params: pairParams,
  query: z.strictObject({ message: messageSchema }),
  success: { status: 204 },
  problems: EDIT_PROBLEMS,
  access: 'pairs:write',
  precondition: 'required',
})
