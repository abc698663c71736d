import * as z from 'zod'
import { idSchema, instantSchema, personSchema, systemParams } from './fields.ts'
import { SCOPES } from './permissions.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const scopeSchema = z.enum(SCOPES).meta({ id: 'Scope', example: 'checks:write' })

export const keySchema = z
  .strictObject({
    id: idSchema,
    name: z.string(),
    kind: z.enum(['read', 'ci']),
    scopes: z.array(scopeSchema),
    hint: z.string().meta({ description: 'How the key begins', example: 'dyw_ci_7Gk2' }),
    owner: personSchema,
    createdAt: instantSchema,
    expiresAt: instantSchema,
    lastUsedAt: z.union([instantSchema, z.null()]),
  })
  .meta({ id: 'Key', description: 'The key itself is shown once, at its making' })
export type KeyWire = z.infer<typeof keySchema>

export const createKeyBody = z
  .strictObject({
    name: z.string().trim().min(1).max(120),
    scopes: z.array(scopeSchema).min(1).max(SCOPES.length),
    days: z
      .int()
      .min(1)
      .max(365)
      .default(90)
      .meta({ description: 'Until it expires; at most 90 for a key that writes' }),
  })
  .meta({ id: 'CreateKey' })

const keyExample = {
  id: 'key_01jd5w7k2m',
  name: 'Timetable pipeline',
  kind: 'ci',
  scopes: ['checks:write'],
  hint: 'dyw_ci_7Gk2',
  owner: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
  createdAt: '2026-11-24T09:12:00.000Z',
  expiresAt: '2027-02-22T09:12:00.000Z',
  lastUsedAt: null,
} as const

export const listKeys = defineContract({
  operationId: 'listKeys',
  method: 'GET',
  path: '/v1/systems/{system}/keys',
  feature: 'keys',
  summary: 'The keys in force: an engineer sees their own',
  params: systemParams,
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(keySchema) }),
    example: { items: [keyExample] },
  },
  problems: READ_PROBLEMS,
  access: 'keys:own',
  conditional: true,
})

export const createKey = defineContract({
  operationId: 'createKey',
  method: 'POST',
  path: '/v1/systems/{system}/keys',
  feature: 'keys',
  summary: 'Makes a key and shows it once',
  description:
    'Scope themes:read alone makes a read key; other scopes make a CI key and take a maintainer.',
  params: systemParams,
  body: createKeyBody,
  bodyExample: { name: 'Timetable pipeline', scopes: ['checks:write'], days: 90 },
  success: {
    status: 201,
    body: keySchema.extend({
      key: z.string().optional().meta({
        description: 'Shown once: absent where an Idempotency-Key is sent again',
      }),
    }),
    example: { ...keyExample, key: 'dyw_ci_(shown once)' },
  },
  problems: WRITE_PROBLEMS,
  access: 'keys:own',
  secrets: ['key'],
})

export const deleteKey = defineContract({
  operationId: 'deleteKey',
  method: 'DELETE',
  path: '/v1/systems/{system}/keys/{id}',
  feature: 'keys',
  summary: 'Revokes a key at once',
  params: systemParams.extend({ id: idSchema }),
  success: { status: 204 },
  problems: [...READ_PROBLEMS, 'origin-foreign'],
  access: 'keys:own',
})
