import * as z from 'zod'
import { idSchema, slugSchema } from './fields.ts'
import { ROLES } from './permissions.ts'
import { READ_PROBLEMS, WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const roleSchema = z.enum(ROLES).meta({ id: 'Role', example: 'maintainer' })

export const meSchema = z
  .strictObject({
    user: z.strictObject({
      id: idSchema,
      email: z.string(),
      name: z.string(),
      admin: z.boolean(),
    }),
    roles: z.record(slugSchema, roleSchema).meta({ description: 'Role by system key' }),
  })
  .meta({ id: 'Me' })
export type MeWire = z.infer<typeof meSchema>

export const signInBody = z
  .strictObject({
    email: z.string().trim().min(3).max(254),
    password: z.string().min(1).max(256),
  })
  .meta({ id: 'SignIn' })

const meExample = {
  user: {
    id: 'usr_01jd5w7k2m',
    email: 'maintainer@larkhaven.example',
    name: 'Ines Marrow',
    admin: false,
  },
  roles: { larkhaven: 'maintainer' },
} as const

export const signIn = defineContract({
  operationId: 'signIn',
  method: 'POST',
  path: '/v1/sign-in',
  feature: 'sessions',
  summary: 'Starts a session and sets its cookie',
  body: signInBody,
  bodyExample: { email: 'maintainer@larkhaven.example', password: 'a long pass phrase' },
  success: { status: 200, body: meSchema, example: meExample },
  problems: [
    'credentials-wrong',
    'origin-foreign',
    'request-too-large',
    'media-type-unsupported',
    'request-invalid',
    'requests-too-many',
  ],
  access: 'anyone',
})

export const signOut = defineContract({
  operationId: 'signOut',
  method: 'POST',
  path: '/v1/sign-out',
  feature: 'sessions',
  summary: 'Ends the session and clears its cookie',
  success: { status: 204 },
  problems: WRITE_PROBLEMS,
  access: 'known',
})

export const getMe = defineContract({
  operationId: 'getMe',
  method: 'GET',
  path: '/v1/me',
  feature: 'sessions',
  summary: 'Who is signed in, with their role in each system',
  success: { status: 200, body: meSchema, example: meExample },
  problems: READ_PROBLEMS,
  access: 'known',
  conditional: true,
})
