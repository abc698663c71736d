import * as z from 'zod'
import { etagSchema, idSchema, instantSchema, systemParams } from './fields.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'
import { roleSchema } from './sessions.contract.ts'

export const memberSchema = z
  .strictObject({
    id: idSchema,
    name: z.string(),
    email: z.string(),
    role: roleSchema,
    since: instantSchema.meta({ description: 'Member of the system since' }),
  })
  .meta({ id: 'Member' })
export type MemberWire = z.infer<typeof memberSchema>

export const putMembersBody = z
  .strictObject({
    items: z
      .array(z.strictObject({ email: z.string().trim().min(3).max(254), role: roleSchema }))
      .max(500),
  })
  .meta({ id: 'PutMembers' })

const members = z.strictObject({ items: z.array(memberSchema), etag: etagSchema })
const example = {
  items: [
    {
      id: 'usr_01jd5w7k2m',
      name: 'Ines Marrow',
      email: 'maintainer@larkhaven.example',
      role: 'maintainer',
      since: '2026-09-01T08:00:00.000Z',
    },
  ],
  etag: '"4d2c"',
} as const

export const listMembers = defineContract({
  operationId: 'listMembers',
  method: 'GET',
  path: '/v1/systems/{system}/members',
  feature: 'members',
  summary: 'Who works on the system, with their roles',
  params: systemParams,
  success: { status: 200, body: members, example },
  problems: READ_PROBLEMS,
  access: 'members:read',
  conditional: true,
})

export const putMembers = defineContract({
  operationId: 'putMembers',
  method: 'PUT',
  path: '/v1/systems/{system}/members',
  feature: 'members',
  summary: 'Replaces the list of members',
  params: systemParams,
  body: putMembersBody,
  bodyExample: { items: [{ email: 'maintainer@larkhaven.example', role: 'maintainer' }] },
  success: { status: 200, body: members, example },
  problems: [...WRITE_PROBLEMS, 'precondition-required', 'precondition-failed'],
  access: 'members:write',
  precondition: 'required',
})
