import * as z from 'zod'
import { etagSchema, idSchema, messageSchema, systemParams, tokenNameSchema } from './fields.ts'
import { effectExample, effectSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS, REVISION_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

const members = {
  name: z.string().trim().min(1).max(120).meta({ example: 'Routes of the chart' }),
  tokens: z
    .array(tokenNameSchema)
    .min(2)
    .max(64)
    .meta({ description: 'By name, each once; their order is kept' }),
}

export const distinctSetSchema = z
  .strictObject({
    id: idSchema,
    name: z.string(),
    tokens: z.array(tokenNameSchema),
    etag: etagSchema,
  })
  .meta({
    id: 'DistinctSet',
    description:
      'Tokens that must stay tellable apart, also with a colour-vision deficiency. Every check measures it; it never gates.',
  })
export type DistinctSetWire = z.infer<typeof distinctSetSchema>

export const createDistinctSetBody = z
  .strictObject({ ...members, message: messageSchema })
  .meta({ id: 'CreateDistinctSet' })

export const patchDistinctSetBody = z
  .strictObject({
    name: members.name.optional(),
    tokens: members.tokens.optional(),
    message: messageSchema,
  })
  .meta({ id: 'PatchDistinctSet', description: 'Absent members stay' })

const setExample = {
  id: 'dst_01jd5w7k2m',
  name: 'Routes of the chart',
  tokens: ['chart.route.1', 'chart.route.2', 'chart.route.3'],
  etag: '"41c8"',
} as const

const writtenSet = distinctSetSchema
  .extend({ effect: effectSchema })
  .meta({ id: 'WrittenDistinctSet' })
const setParams = systemParams.extend({ id: idSchema })

export const listDistinctSets = defineContract({
  operationId: 'listDistinctSets',
  method: 'GET',
  path: '/v1/systems/{system}/distinct-sets',
  feature: 'distinct-sets',
  summary: 'The distinct sets, in the order they were made',
  params: systemParams,
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(distinctSetSchema) }),
    example: { items: [setExample] },
  },
  problems: READ_PROBLEMS,
  access: 'distinct-sets:read',
  conditional: true,
})

export const createDistinctSet = defineContract({
  operationId: 'createDistinctSet',
  method: 'POST',
  path: '/v1/systems/{system}/distinct-sets',
  feature: 'distinct-sets',
  summary: 'Makes a distinct set; makes one revision',
  description: 'A system has at most 100.',
  params: systemParams,
  body: createDistinctSetBody,
  bodyExample: { name: 'Routes of the chart', tokens: ['chart.route.1', 'chart.route.2'] },
  success: { status: 201, body: writtenSet, example: { ...setExample, effect: effectExample } },
  problems: [...REVISION_PROBLEMS, 'distinct-set-name-taken'],
  access: 'distinct-sets:write',
})

export const getDistinctSet = defineContract({
  operationId: 'getDistinctSet',
  method: 'GET',
  path: '/v1/systems/{system}/distinct-sets/{id}',
  feature: 'distinct-sets',
  summary: 'One distinct set',
  params: setParams,
  success: { status: 200, body: distinctSetSchema, example: setExample },
  problems: READ_PROBLEMS,
  access: 'distinct-sets:read',
  conditional: true,
})

export const patchDistinctSet = defineContract({
  operationId: 'patchDistinctSet',
  method: 'PATCH',
  path: '/v1/systems/{system}/distinct-sets/{id}',
  feature: 'distinct-sets',
  summary: 'Edits a distinct set; makes one revision',
  params: setParams,
  body: patchDistinctSetBody,
  bodyExample: { name: 'Routes', message: 'Said shorter' },
  success: { status: 200, body: writtenSet, example: { ...setExample, effect: effectExample } },
  problems: [...EDIT_PROBLEMS, 'distinct-set-name-taken'],
  access: 'distinct-sets:write',
  precondition: 'required',
})

export const deleteDistinctSet = defineContract({
  operationId: 'deleteDistinctSet',
  method: 'DELETE',
  path: '/v1/systems/{system}/distinct-sets/{id}',
  feature: 'distinct-sets',
  summary: 'Removes a distinct set; makes one revision',
  description: 'It gates nothing, so that its removal weakens nothing.',
  params: setParams,
  query: z.strictObject({ message: messageSchema }),
  success: { status: 204 },
  problems: EDIT_PROBLEMS,
  access: 'distinct-sets:write',
  precondition: 'required',
})
