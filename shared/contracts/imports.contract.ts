import * as z from 'zod'
import { messageSchema, systemParams, tokenNameSchema } from './fields.ts'
import { importExample, importModeSchema, importSchema } from './import-outcome.ts'
import { jobExample, jobSchema } from './jobs.contract.ts'
import { READ_PROBLEMS, REVISION_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

/** A file has at most 8 MiB. */
export const MOST_FILE_BYTES = 8 * 2 ** 20

const flagSchema = (description: string) =>
  z
    .enum(['true', 'false'])
    .default('false')
    .transform((text) => text === 'true')
    .meta({ description, type: 'string', enum: ['true', 'false'], default: 'false' })

export const importBody = z.union([z.record(z.string(), z.unknown()), z.string()]).meta({
  id: 'ImportFile',
  description:
    'A token file or a resolver file of the Design Tokens modules 2025.10; or, as text, a style sheet',
})

export const createImport = defineContract({
  operationId: 'createImport',
  method: 'POST',
  path: '/v1/systems/{system}/imports',
  feature: 'imports',
  summary:
    'Reads a token file, a resolver file or a style sheet into the system; makes one revision, or none',
  description:
    'One fault and nothing changes: every fault of the file is told, with a pointer into it. Tokens are told by the id that a file of this service gives them, else by name. Of a resolver file the contexts of the modifier theme (else of the first) become themes, their first or default one the base. What is no colour is kept and comes back verbatim; of a style sheet it is left out and listed. An import that merges tokens alone takes tokens:write; what else it changes takes the permission for that. Long work is answered with 202 and a job.',
  params: systemParams,
  query: z.strictObject({
    dryRun: flagSchema('true: nothing is written, the answer tells what would change'),
    mode: importModeSchema.default('merge'),
    legacyHex: flagSchema('true: colours written as text of hexadecimal digits are read too'),
    hyphensAsDots: flagSchema('true: of a style sheet --action-board becomes action.board'),
    ground: tokenNameSchema
      .optional()
      .meta({ description: 'Page background of themes whose file does not tell it' }),
    ink: tokenNameSchema
      .optional()
      .meta({ description: 'Text colour of themes whose file does not tell it' }),
    message: messageSchema,
  }),
  body: importBody,
  bodyExample: {
    action: {
      board: {
        fill: {
          $type: 'color',
          $value: { colorSpace: 'oklch', components: [0.6, 0.128, 243], alpha: 1 },
        },
      },
    },
  },
  maxBodyBytes: MOST_FILE_BYTES,
  takesFile: true,
  success: { status: 200, body: importSchema, example: importExample },
  deferred: { body: jobSchema, example: jobExample },
  problems: [...REVISION_PROBLEMS, 'token-locked', 'token-in-use'],
  access: 'tokens:write',
})

const resolverFileSchema = z
  .looseObject({
    version: z.enum(['2025.10']),
    sets: z.record(z.string(), z.unknown()),
    modifiers: z.record(z.string(), z.unknown()).optional(),
    resolutionOrder: z.array(z.unknown()),
  })
  .meta({ id: 'ResolverFile', description: 'Design Tokens Resolver Module 2025.10' })

export const getResolverFile = defineContract({
  operationId: 'getResolverFile',
  method: 'GET',
  path: '/v1/systems/{system}/resolver.json',
  feature: 'imports',
  summary: 'The whole system of the head revision as one resolver file',
  description:
    'Design Tokens Resolver Module 2025.10: any resolver gives each token in each theme and state. Read in by this service it is the same system again.',
  params: systemParams,
  success: {
    status: 200,
    media: ['application/json'],
    body: resolverFileSchema,
    example: {
      version: '2025.10',
      sets: { core: { sources: [{}] } },
      resolutionOrder: [{ $ref: '#/sets/core' }],
    },
  },
  problems: READ_PROBLEMS,
  access: 'themes:read',
  conditional: true,
})
