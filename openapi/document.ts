import {
  OpenAPIRegistry,
  OpenApiGeneratorV31,
  type ResponseConfig,
  type RouteConfig,
} from '@asteasolutions/zod-to-openapi'
import * as z from 'zod'
import { contracts } from '#shared/contracts/contracts.ts'
import { rolesWith, scopesWith } from '#shared/contracts/permissions.ts'
import { PROBLEMS, type ProblemCode, problemSchema } from '#shared/contracts/problems.ts'
import { type Contract, takesIdempotencyKey } from '#shared/contracts/route.ts'
import { problemExample } from './problem-examples.ts'
import { createProblemResponses, headerRef, RATE_LIMIT, REQUEST_ID } from './problem-responses.ts'

const HEADERS = {
  'X-Request-Id': { description: 'Finds the line in the log', schema: { type: 'string' } },
  ETag: { description: 'Strong validator', schema: { type: 'string' } },
  Location: { description: 'The address of what was made', schema: { type: 'string' } },
  Link: { description: 'rel="next" where a further page is', schema: { type: 'string' } },
  'Set-Cookie': { description: 'The session, HttpOnly', schema: { type: 'string' } },
  'WWW-Authenticate': { description: 'Bearer', schema: { type: 'string' } },
  Allow: { description: 'The methods it takes', schema: { type: 'string' } },
  'Retry-After': { description: 'Seconds', schema: { type: 'integer' } },
  RateLimit: {
    description:
      'What is left: for each of "address", "key" and "system" that pays for the call, r requests within t seconds',
    schema: { type: 'string' },
  },
  'RateLimit-Policy': {
    description: 'The budgets: q requests in w seconds; pk tells whose, by a digest',
    schema: { type: 'string' },
  },
} as const

/** The document of the service, made from its contracts alone. */
export function createDocument() {
  const registry = new OpenAPIRegistry()
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'dyewright',
    description: 'Set by signing in; called __Host-dyewright where the service is reached by https',
  })
  registry.registerComponent('securitySchemes', 'key', {
    type: 'http',
    scheme: 'bearer',
    bearerFormat: 'dyw_<kind>_…',
    description: 'A key of one system; it beats a cookie',
  })
  for (const code of Object.keys(PROBLEMS) as ProblemCode[]) {
    registry.registerComponent('examples', code, {
      summary: PROBLEMS[code].title,
      value: problemExample(code),
    })
  }
  for (const [name, header] of Object.entries(HEADERS)) {
    registry.registerComponent('headers', name, header)
  }
  const problemsOf = createProblemResponses(registry)
  for (const contract of inOrder()) {
    registry.registerPath(operationOf(contract, problemsOf(contract)))
  }
  const definitions = [...registry.definitions, { type: 'schema' as const, schema: problemSchema }]
  return new OpenApiGeneratorV31(definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Dyewright',
      version: '1',
      description:
        'Design-token colour governance: tokens, themes, states and declared pairs of a design system, and the verdict on every pair’s contrast by WCAG 2.x. A verdict is no statement of conformity: contrast is one criterion among many.',
    },
    servers: [{ url: '/' }],
    tags: [...new Set(contracts.map(({ feature }) => feature))].map((name) => ({ name })),
  })
}

const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE']
const rankOf = ({ path, method }: Contract): string => `${path} ${METHODS.indexOf(method)}`

/** Loaders differ in the order in which they list a module's exports; the committed text must not. */
function inOrder(): Contract[] {
  const features = [...new Set(contracts.map(({ feature }) => feature))]
  return features.flatMap((feature) =>
    contracts
      .filter((contract) => contract.feature === feature)
      .sort((a, b) => (rankOf(a) < rankOf(b) ? -1 : 1)),
  )
}

export type OpenApiDocument = ReturnType<typeof createDocument>

/** The committed text of a document. */
export const documentText = (document: OpenApiDocument): string =>
  `${JSON.stringify(document, null, 2)}\n`

function operationOf(contract: Contract, problems: RouteConfig['responses']): RouteConfig {
  const { operationId, path, feature, summary, params, query } = contract
  const headers = requestHeaders(contract)
  return {
    operationId,
    method: contract.method.toLowerCase() as RouteConfig['method'],
    path,
    tags: [feature],
    summary,
    description: descriptionOf(contract),
    security: contract.access === 'anyone' ? [] : securityOf(contract),
    request: {
      ...(params === undefined ? {} : { params }),
      ...(query === undefined ? {} : { query }),
      ...(headers === undefined ? {} : { headers }),
      ...(contract.body === undefined ? {} : { body: bodyOf(contract) }),
    },
    responses: {
      [contract.success.status]: successOf(contract),
      ...(contract.precondition === 'create' ? { 201: madeOf(contract) } : {}),
      ...(contract.deferred === undefined ? {} : { 202: deferredOf(contract.deferred) }),
      ...(contract.conditional
        ? {
            304: {
              description: 'Not modified since',
              headers: { ...REQUEST_ID, ...RATE_LIMIT, ...ETAG },
            },
          }
        : {}),
      ...problems,
    },
  }
}

function descriptionOf({ access, description }: Contract): string {
  const sentence = description === undefined ? '' : `${description} `
  if (access === 'anyone') return `${sentence}Anyone may call it.`
  if (access === 'known') return `${sentence}Anyone with a session or a key may call it.`
  const scopes = scopesWith(access)
  const keys = scopes.length === 0 ? '' : `, or a key with ${scopes.join(' or ')}`
  return `${sentence}Takes the role ${rolesWith(access).join(', ')}${keys}.`
}

const securityOf = ({ access }: Contract): Record<string, string[]>[] => {
  const hasKeys = access === 'known' || access === 'anyone' || takesKeys(access)
  return hasKeys ? [{ session: [] }, { key: [] }] : [{ session: [] }]
}

const takesKeys = (permission: Exclude<Contract['access'], 'known' | 'anyone'>): boolean =>
  scopesWith(permission).length > 0 ||
  scopesWith(`${permission}-own` as typeof permission).length > 0

const validator = (description: string) => z.string().meta({ description, example: '"9c3e1f20"' })

/** @see https://datatracker.ietf.org/doc/draft-ietf-httpapi-idempotency-key-header */
const IDEMPOTENCY_KEY = z.string().optional().meta({
  description:
    'Names the request, best by a UUID. Sent again with the same key by the same caller to the same address within 24 hours, it has no second effect and is answered as the first time, without what is shown once; with another body it is refused with 422, while the first still runs with 409. Only successes are kept.',
  example: '"8e03978e-40d5-43dd-bc93-6894a57f9324"',
})

function requestHeaders(contract: Contract) {
  const { precondition, conditional } = contract
  const ifMatch = validator('The ETag that was read')
  const fields = {
    ...(takesIdempotencyKey(contract) ? { 'Idempotency-Key': IDEMPOTENCY_KEY } : {}),
    ...(precondition === 'required' ? { 'If-Match': ifMatch } : {}),
    ...(precondition === 'create'
      ? {
          'If-Match': ifMatch.optional(),
          'If-None-Match': z
            .string()
            .optional()
            .meta({ description: 'To create: nothing may stand there yet', example: '*' }),
        }
      : {}),
    ...(conditional
      ? { 'If-None-Match': validator('Answers 304 while it still holds').optional() }
      : {}),
  }
  return Object.keys(fields).length === 0 ? undefined : z.object(fields)
}

function bodyOf({ body, bodyExample, takesFile }: Contract) {
  const media = {
    schema: body as z.ZodType,
    ...(bodyExample === undefined ? {} : { example: bodyExample }),
  }
  const asFile = { schema: FORM, example: { file: JSON.stringify(bodyExample) } }
  const form = takesFile ? { 'multipart/form-data': asFile } : {}
  return { required: true, content: { 'application/json': media, ...form } }
}

const FORM = z.strictObject({
  file: z.string().meta({
    format: 'binary',
    description: 'The same as the JSON body, as a file; a style sheet where it is text/css',
  }),
})

/** What an operation answers whose work goes on. */
function deferredOf({ body, example }: NonNullable<Contract['deferred']>): ResponseConfig {
  return {
    description: 'Taken on: ask at Location how far it is',
    headers: { ...REQUEST_ID, ...LOCATION },
    content: { 'application/json': { schema: body, example } },
  }
}

const ETAG = headerRef('ETag')
const LOCATION = headerRef('Location')

function successOf(contract: Contract): ResponseConfig {
  const { success, alternatives = [], conditional, precondition, query, operationId } = contract
  const isPaged = query !== undefined && 'cursor' in query.shape
  const hasEtag = success.status !== 204 && (conditional || precondition !== undefined)
  const headers = {
    ...REQUEST_ID,
    ...(contract.budget === 'none' ? {} : RATE_LIMIT),
    ...(hasEtag ? ETAG : {}),
    ...(isPaged ? headerRef('Link') : {}),
    ...(success.status === 201 ? LOCATION : {}),
    ...(operationId === 'signIn' ? headerRef('Set-Cookie') : {}),
  }
  if (success.status === 204) return { description: 'Done', headers }
  const { body: schema, example } = success
  const media = 'media' in success ? success.media : ['application/json']
  const bare = media.map((type) => type.replace(/;.*$/, ''))
  return {
    description: 'Success',
    headers,
    content: {
      ...Object.fromEntries(bare.map((type) => [type, { schema, example }])),
      ...Object.fromEntries(
        alternatives.map(({ media: type, body, example: shown }) => [
          type,
          { schema: body, example: shown },
        ]),
      ),
    },
  }
}

/** What a PUT answers that made something: as its replacement does, with the address besides. */
function madeOf(contract: Contract): ResponseConfig {
  const { headers, ...replaced } = successOf(contract)
  return { ...replaced, description: 'Made', headers: { ...headers, ...LOCATION } }
}
