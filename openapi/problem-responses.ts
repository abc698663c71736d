import type { OpenAPIRegistry } from '@asteasolutions/zod-to-openapi'
import { PROBLEMS, type ProblemCode } from '#shared/contracts/problems.ts'
import { type Contract, problemsOf } from '#shared/contracts/route.ts'

const MEDIA = 'application/problem+json'

export const headerRef = <N extends string>(name: N) =>
  ({ [name]: { $ref: `#/components/headers/${name}` } }) as Record<N, { $ref: string }>

/** Of whatever is paid for. */
export const RATE_LIMIT = { ...headerRef('RateLimit'), ...headerRef('RateLimit-Policy') }

const HEADERS: Readonly<Record<number, Record<string, { $ref: string }>>> = {
  401: headerRef('WWW-Authenticate'),
  405: headerRef('Allow'),
  429: { ...headerRef('Retry-After'), ...RATE_LIMIT },
  503: headerRef('Retry-After'),
}

/** Component responses, gathered while the operations are described: most are refused alike. */
export function createProblemResponses(registry: OpenAPIRegistry) {
  const known = new Set<string>()
  const refer = (status: number, codes: readonly ProblemCode[]) => {
    const name = codes.join('.')
    if (!known.has(name)) registry.registerComponent('responses', name, responseOf(status, codes))
    known.add(name)
    return { $ref: `#/components/responses/${name}` }
  }
  /** Every code an operation can be refused with, grouped by status. */
  return (contract: Contract) => {
    const codes = problemsOf(contract).sort()
    const statuses = [...new Set(codes.map((code) => PROBLEMS[code].status))]
    return Object.fromEntries(
      statuses.map((status) => [
        String(status),
        refer(
          status,
          codes.filter((code) => PROBLEMS[code].status === status),
        ),
      ]),
    )
  }
}

const responseOf = (status: number, codes: readonly ProblemCode[]) => ({
  description: codes.map((code) => `${code}: ${PROBLEMS[code].title}`).join('; '),
  headers: {
    ...REQUEST_ID,
    ...HEADERS[status],
    ...(codes.includes('idempotency-key-running') ? headerRef('Retry-After') : {}),
  },
  content: {
    [MEDIA]: {
      schema: { $ref: '#/components/schemas/Problem' },
      examples: Object.fromEntries(
        codes.map((code) => [code, { $ref: `#/components/examples/${code}` }]),
      ),
    },
  },
})

/** On every answer. */
export const REQUEST_ID = headerRef('X-Request-Id')
