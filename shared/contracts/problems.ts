import * as z from 'zod'

/**
 * Every refusal of the service: code → HTTP status and title. The code is the last segment of the
 * problem's `type` and the address of a page a person can read (`/problems/<code>`).
 * @see https://www.rfc-editor.org/rfc/rfc9457
 */
export const PROBLEMS = {
  'request-unreadable': { status: 400, title: 'The request cannot be read' },
  'parameter-invalid': { status: 400, title: 'A parameter cannot be used' },
  'host-unknown': { status: 400, title: 'This service does not answer to that host name' },
  'sign-in-required': { status: 401, title: 'Sign in, or send a key' },
  'credentials-wrong': { status: 401, title: 'E-mail and password do not match' },
  'key-refused': { status: 401, title: 'The key is not valid' },
  'role-missing': { status: 403, title: 'Your role does not allow this' },
  'scope-missing': { status: 403, title: 'The key lacks a scope' },
  'weakening-needs-approval': { status: 403, title: 'The edit weakens, and needs approval' },
  'origin-foreign': { status: 403, title: 'The request comes from another site' },
  'not-found': { status: 404, title: 'There is nothing here' },
  'method-not-allowed': { status: 405, title: 'This address does not take that method' },
  'not-acceptable': { status: 406, title: 'None of the wanted types can be given' },
  'request-timed-out': { status: 408, title: 'The request did not arrive in time' },
  'system-key-taken': { status: 409, title: 'Another system has this key' },
  'token-name-taken': { status: 409, title: 'Another token has this name' },
  'token-in-use': { status: 409, title: 'The token is used elsewhere' },
  'token-locked': { status: 409, title: 'The token is locked' },
  'pair-already-declared': { status: 409, title: 'This pair is declared already' },
  'distinct-set-name-taken': { status: 409, title: 'Another distinct set has this name' },
  'theme-in-use': { status: 409, title: 'The theme is used elsewhere' },
  'css-name-collision': { status: 409, title: 'Two tokens come to one CSS name' },
  'idempotency-key-running': { status: 409, title: 'The first request with this key still runs' },
  'review-required': { status: 409, title: 'This system takes edits by review only' },
  'precondition-failed': { status: 412, title: 'It has changed since it was read' },
  'request-too-large': { status: 413, title: 'The request is too large' },
  'media-type-unsupported': { status: 415, title: 'The service does not read this media type' },
  'request-invalid': { status: 422, title: 'The request was read and refused' },
  'idempotency-key-reused': { status: 422, title: 'This key was sent with another request' },
  'system-unresolvable': { status: 422, title: 'The colours cannot be resolved with this edit' },
  'precondition-required': { status: 428, title: 'Say which version the edit is meant for' },
  'rate-limited': { status: 429, title: 'The budget of requests is used up' },
  'requests-too-many': { status: 429, title: 'Too many requests' },
  'request-head-too-large': { status: 431, title: 'The head of the request is too large' },
  'server-unexpected': { status: 500, title: 'The service failed' },
  'job-interrupted': { status: 503, title: 'The work broke off before its end' },
  'service-unavailable': { status: 503, title: 'The service cannot answer just now' },
} as const satisfies Record<string, { status: number; title: string }>

export type ProblemCode = keyof typeof PROBLEMS

/** What any call can be refused with, so that no contract need list it. */
export const GENERAL_PROBLEMS = [
  'request-unreadable',
  'parameter-invalid',
  'host-unknown',
  'not-found',
  'method-not-allowed',
  'server-unexpected',
  'service-unavailable',
] as const satisfies readonly ProblemCode[]

/** What a call with an `Idempotency-Key` can be refused with besides. */
export const IDEMPOTENCY_PROBLEMS = [
  'idempotency-key-running',
  'idempotency-key-reused',
] as const satisfies readonly ProblemCode[]

export const faultSchema = z
  .strictObject({
    pointer: z
      .string()
      .optional()
      .meta({ description: 'RFC 6901 pointer into the body', example: '/values/dark/rest' }),
    parameter: z
      .string()
      .optional()
      .meta({ description: 'Name of the query parameter, path parameter or header' }),
    detail: z.string().meta({ example: 'Expected a CSS colour' }),
    code: z.string().optional().meta({ description: 'Names the kind of fault' }),
  })
  .meta({ id: 'Fault', description: 'One thing that is wrong with a request' })

export type Fault = z.infer<typeof faultSchema>

/** The one shape of every answer that is not a success (`application/problem+json`). */
export const problemSchema = z
  .looseObject({
    type: z.string().meta({ example: '/problems/request-invalid' }),
    title: z.string(),
    status: z.int().meta({ example: 422 }),
    detail: z.string().optional(),
    instance: z.string().optional(),
    errors: z.array(faultSchema).max(100).optional(),
    more: z.int().min(1).optional().meta({ description: 'Faults besides those in errors' }),
    requestId: z.string(),
  })
  .meta({ id: 'Problem', description: 'Problem document of RFC 9457' })

export type Problem = z.infer<typeof problemSchema>

/** What any read by someone known can be refused with. */
export const READ_PROBLEMS = [
  'sign-in-required',
  'key-refused',
  'role-missing',
  'scope-missing',
] as const satisfies readonly ProblemCode[]

/** What any write by someone known can be refused with. */
export const WRITE_PROBLEMS = [
  ...READ_PROBLEMS,
  'origin-foreign',
  'request-too-large',
  'media-type-unsupported',
  'request-invalid',
] as const satisfies readonly ProblemCode[]

/** What a write that makes a revision can be refused with besides. */
export const REVISION_PROBLEMS = [
  ...WRITE_PROBLEMS,
  'system-unresolvable',
  'review-required',
  'weakening-needs-approval',
] as const satisfies readonly ProblemCode[]

/** What an edit of something that stands can be refused with besides. */
export const EDIT_PROBLEMS = [
  ...REVISION_PROBLEMS,
  'precondition-required',
  'precondition-failed',
] as const satisfies readonly ProblemCode[]
