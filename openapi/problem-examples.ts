import { type Problem, PROBLEMS, type ProblemCode } from '#shared/contracts/problems.ts'

/** What a refusal says besides its type, title and status. */
type Said = Omit<Problem, 'type' | 'title' | 'status' | 'requestId'>

const pointer = (at: string, detail: string): Said => ({ errors: [{ pointer: at, detail }] })
const parameter = (name: string, detail: string): Said => ({
  errors: [{ parameter: name, detail }],
})

const SAID: { readonly [code in ProblemCode]?: Said } = {
  'request-unreadable': { detail: 'The body is not JSON' },
  'parameter-invalid': parameter('limit', 'Expected a whole number'),
  'key-refused': { detail: 'The key is mistyped, expired or revoked' },
  'role-missing': {
    detail: 'This takes the role maintainer or admin',
    roles: ['maintainer', 'admin'],
  },
  'scope-missing': { detail: 'The key lacks the scope tokens:write', scopes: ['tokens:write'] },
  'weakening-needs-approval': {
    detail: 'An accessibility-lead approves what weakens, in a change',
    ...pointer('/minimum', 'It asks for less than before'),
  },
  'not-found': { detail: 'No token action.board.fill' },
  'method-not-allowed': { detail: 'It takes GET, HEAD, OPTIONS' },
  'not-acceptable': {
    detail: 'It can be given as application/json or application/sarif+json',
  },
  'system-key-taken': { detail: 'There is a system larkhaven' },
  'token-name-taken': { detail: 'There is a token action.board.fill' },
  'token-in-use': { detail: 'It is used by the pair action.board.text on action.board.fill' },
  'css-name-collision': { detail: 'a.b and a-b come to --a-b' },
  'precondition-failed': {
    detail: 'It has changed since',
    current: { name: 'action.board.fill', value: '#2b6cb0', etag: '"5b0e7c21"' },
  },
  'request-too-large': { detail: 'At most 1 MiB', limitBytes: 1_048_576 },
  'media-type-unsupported': {
    detail: 'Send application/json, in UTF-8',
    ...parameter('Content-Type', 'Expected application/json'),
  },
  'request-invalid': {
    errors: [
      { pointer: '/value', detail: 'Expected a CSS colour' },
      { pointer: '/values/dark/rest', detail: 'Expected a CSS colour' },
    ],
  },
  'idempotency-key-reused': parameter(
    'Idempotency-Key',
    'It came with another body, query or Accept before',
  ),
  'system-unresolvable': pointer('/value', 'action.board.fill refers to itself'),
  'precondition-required': {
    detail: 'Send If-Match with the ETag you have read',
    ...parameter('If-Match', 'Missing'),
  },
  'rate-limited': {
    detail: 'The budget of this key, 12000 requests, is used up for 42 s',
  },
  'requests-too-many': { detail: 'Too many attempts: the next one is looked at in 8 s' },
}

/** Answers what a refusal looks like on the wire. */
export function problemExample(code: ProblemCode): Problem {
  const { status, title } = PROBLEMS[code]
  return {
    type: `/problems/${code}`,
    title,
    status,
    ...SAID[code],
    requestId: 'req_01kb2rz7y8e6k0s9d4m1p3q5t7',
  }
}
