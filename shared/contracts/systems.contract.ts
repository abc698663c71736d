import * as z from 'zod'
import {
  etagSchema,
  idSchema,
  instantSchema,
  levelSchema,
  messageSchema,
  personSchema,
  slugSchema,
  systemParams,
} from './fields.ts'
import { effectExample, effectSchema, verdictSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const writeModeSchema = z.enum(['direct', 'review']).meta({ id: 'WriteMode' })

const branchPattern = (description: string, example: string) =>
  z
    .string()
    .trim()
    .min(1)
    .max(255)
    .regex(/^\P{Cc}*$/u, 'No control characters')
    .meta({ description, example, pattern: '^\\P{Cc}*$' })

export const protectedBranchSchema = z
  .strictObject({
    repository: branchPattern('* stands for any characters', 'larkhaven/timetable'),
    branch: branchPattern('* stands for any characters', 'release-*'),
  })
  .meta({ id: 'ProtectedBranch', description: 'Its breaches in CI stand in the breach log' })
export type ProtectedBranchWire = z.infer<typeof protectedBranchSchema>

const settings = {
  level: levelSchema,
  p3: z.boolean().meta({ description: 'Display P3 values ship, and are measured' }),
  p3Gates: z.boolean().meta({ description: 'The P3 ratio gates where it is the lower one' }),
  disabledFloor: z
    .number()
    .min(1)
    .max(21)
    .nullable()
    .meta({ type: ['number', 'null'], description: 'Own least ratio in disabled, else exempt' }),
}

export const systemSchema = z
  .strictObject({
    id: idSchema,
    key: slugSchema,
    name: z.string(),
    writeMode: writeModeSchema,
    protectedBranches: z.array(protectedBranchSchema),
    ...settings,
    counts: z.strictObject({
      tokens: z.int(),
      pairs: z.int(),
      themes: z.int(),
      openBreaches: z.int(),
    }),
    head: z.strictObject({
      revision: z.int().min(0),
      at: instantSchema,
      author: z.union([personSchema, z.null()]),
      verdict: verdictSchema,
    }),
    latestRelease: z
      .string()
      .nullable()
      .meta({ type: ['string', 'null'] }),
    etag: etagSchema,
  })
  .meta({ id: 'System' })
export type SystemWire = z.infer<typeof systemSchema>

export const createSystemBody = z
  .strictObject({
    key: slugSchema,
    name: z.string().trim().min(1).max(120),
    level: levelSchema.default('AA'),
    p3: settings.p3.default(true),
    p3Gates: settings.p3Gates.default(true),
    disabledFloor: settings.disabledFloor.default(null),
  })
  .meta({ id: 'CreateSystem' })

export const patchSystemBody = z
  .strictObject({
    name: z.string().trim().min(1).max(120).optional(),
    writeMode: writeModeSchema.optional(),
    protectedBranches: z
      .array(protectedBranchSchema)
      .max(100)
      .optional()
      .meta({ description: 'The whole list' }),
    level: levelSchema.optional(),
    p3: settings.p3.optional(),
    p3Gates: settings.p3Gates.optional(),
    disabledFloor: settings.disabledFloor.optional(),
    message: messageSchema,
  })
  .meta({ id: 'PatchSystem' })

export const systemExample = {
  id: 'sys_01jd5w7k2m',
  key: 'larkhaven',
  name: 'Larkhaven Ferries',
  writeMode: 'direct',
  protectedBranches: [{ repository: 'larkhaven/timetable', branch: 'main' }],
  level: 'AA',
  p3: true,
  p3Gates: true,
  disabledFloor: null,
  counts: { tokens: 117, pairs: 160, themes: 3, openBreaches: 9 },
  head: {
    revision: 214,
    at: '2026-11-24T09:12:00.000Z',
    author: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' },
    verdict: 'fail',
  },
  latestRelease: null,
  etag: '"9c3e1f20"',
} as const

export const listSystems = defineContract({
  operationId: 'listSystems',
  method: 'GET',
  path: '/v1/systems',
  feature: 'systems',
  summary: 'The systems that the caller may know of, with their counts',
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(systemSchema) }),
    example: { items: [systemExample] },
  },
  problems: READ_PROBLEMS,
  access: 'known',
  conditional: true,
})

export const createSystem = defineContract({
  operationId: 'createSystem',
  method: 'POST',
  path: '/v1/systems',
  feature: 'systems',
  summary: 'Makes an empty system; revision 0 has no token and no theme',
  body: createSystemBody,
  bodyExample: { key: 'larkhaven', name: 'Larkhaven Ferries', level: 'AA' },
  success: { status: 201, body: systemSchema, example: systemExample },
  problems: [...WRITE_PROBLEMS, 'system-key-taken'],
  access: 'systems:create',
})

export const getSystem = defineContract({
  operationId: 'getSystem',
  method: 'GET',
  path: '/v1/systems/{system}',
  feature: 'systems',
  summary: 'One system with its settings, counts and head',
  params: systemParams,
  success: { status: 200, body: systemSchema, example: systemExample },
  problems: READ_PROBLEMS,
  access: 'system:read',
  conditional: true,
})

export const patchSystem = defineContract({
  operationId: 'patchSystem',
  method: 'PATCH',
  path: '/v1/systems/{system}',
  feature: 'systems',
  summary: 'Changes name, write mode, protected branches or settings',
  description:
    'Level, P3 and the disabled floor make a revision; name, write mode and protected branches are audited only. An accessibility lead may change level, write mode and protected branches, and alone may set direct again or take a protected branch away.',
  params: systemParams,
  body: patchSystemBody,
  bodyExample: { level: 'AAA', message: 'Read in glare' },
  success: {
    status: 200,
    body: systemSchema.extend({ effect: effectSchema }),
    example: { ...systemExample, effect: effectExample },
  },
  problems: EDIT_PROBLEMS,
  access: 'settings:write',
  precondition: 'required',
})
