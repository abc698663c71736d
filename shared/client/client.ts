import { addressOf, type Contract, type InputOf, type OutputOf } from '#shared/contracts/route.ts'
import type { Problem } from '#shared/contracts/problems.ts'

/** One request as the transport gets it. */
export interface SentRequest {
  readonly method: string
  readonly url: string
  readonly headers: Readonly<Record<string, string>>
  readonly body?: string
}

/** One answer as the transport gives it; header names in lower case. */
export interface ReceivedAnswer {
  readonly status: number
  readonly headers: Readonly<Record<string, string | undefined>>
  readonly body: string
}

/** Carries a request; the console hands in `fetch`, the gate `node:http`. */
export type Send = (request: SentRequest) => Promise<ReceivedAnswer>

/** A success: the body, its validator, and the cursor of the next page where there is one. */
export interface Answer<T> {
  readonly status: number
  readonly body: T
  readonly etag?: string
  readonly next?: string
}

/** Any answer that is not a success; `problem` is absent where the answer was not a problem document. */
export class ApiError extends Error {
  override readonly name = 'ApiError'
  readonly status: number
  readonly problem: Problem | undefined
  readonly retryAfterSeconds: number | undefined

  constructor(status: number, problem: Problem | undefined, retryAfterSeconds?: number) {
    super(problem?.detail ?? problem?.title ?? `The service answered ${status}`)
    this.status = status
    this.problem = problem
    this.retryAfterSeconds = retryAfterSeconds
  }

  /** The refusal's code, the last segment of the problem's type. */
  get code(): string | undefined {
    return this.problem?.type.split('/').at(-1)
  }
}

/** How a client reaches the service. */
export interface ClientOptions {
  /** Origin of the service; empty for the page's own. */
  readonly baseUrl: string
  readonly send: Send
  /** Sent with every request, for example `authorization`. */
  readonly headers?: Readonly<Record<string, string>>
}

/** Sends one operation and gives its answer. @throws {ApiError} (rejects) where the service refuses */
export type Call = <C extends Contract>(
  contract: C,
  input: InputOf<C>,
) => Promise<Answer<OutputOf<C>>>

interface LooseInput {
  readonly params?: Readonly<Record<string, unknown>>
  readonly query?: Readonly<Record<string, unknown>>
  readonly body?: unknown
  readonly ifMatch?: string
  readonly ifNoneMatch?: string
  readonly idempotencyKey?: string
}

const urlOf = (baseUrl: string, contract: Contract, { params, query }: LooseInput): string => {
  const filled = addressOf(contract, params)
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(query ?? {})) {
    for (const one of Array.isArray(value) ? value : [value]) {
      if (one !== undefined) search.append(name, String(one))
    }
  }
  const text = search.toString()
  return `${baseUrl}${filled}${text ? `?${text}` : ''}`
}

const headersOf = (options: ClientOptions, contract: Contract, input: LooseInput) => {
  const headers: Record<string, string> = { ...options.headers }
  headers.accept =
    'media' in contract.success ? '*/*' : 'application/json, application/problem+json'
  if (input.body !== undefined) headers['content-type'] = 'application/json'
  if (input.ifMatch !== undefined) headers['if-match'] = input.ifMatch
  if (input.ifNoneMatch !== undefined) headers['if-none-match'] = input.ifNoneMatch
  if (input.idempotencyKey !== undefined) {
    headers['idempotency-key'] = JSON.stringify(input.idempotencyKey)
  }
  return headers
}

const problemIn = (answer: ReceivedAnswer): Problem | undefined => {
  if (!answer.headers['content-type']?.includes('problem+json')) return undefined
  try {
    return JSON.parse(answer.body) as Problem
  } catch {
    return undefined
  }
}

const cursorIn = (link: string | undefined): string | undefined => {
  const target = link?.match(/<([^>]*)>;\s*rel="next"/)?.[1]
  return target === undefined
    ? undefined
    : (new URL(target, 'http://localhost').searchParams.get('cursor') ?? undefined)
}

/**
 * Makes the one client of the API: `call(contract, input)` sends what the contract describes.
 * @throws {ApiError} (rejects) on every answer that is not a success
 * @example const { body } = await createClient({ baseUrl, send })(getToken, { params: { system, name } })
 */
export function createClient(options: ClientOptions): Call {
  return async <C extends Contract>(contract: C, input: InputOf<C>) => {
    const given = input as LooseInput
    const answer = await options.send({
      method: contract.method,
      url: urlOf(options.baseUrl, contract, given),
      headers: headersOf(options, contract, given),
      ...(given.body === undefined ? {} : { body: JSON.stringify(given.body) }),
    })
    if (answer.status < 200 || answer.status > 299) {
      const seconds = Number(answer.headers['retry-after'])
      throw new ApiError(
        answer.status,
        problemIn(answer),
        Number.isFinite(seconds) ? seconds : undefined,
      )
    }
    const isText = 'media' in contract.success
    const body = answer.status === 204 ? undefined : isText ? answer.body : JSON.parse(answer.body)
    const etag = answer.headers.etag
    const next = cursorIn(answer.headers.link)
    return {
      status: answer.status,
      body: body as OutputOf<C>,
      ...(etag === undefined ? {} : { etag }),
      ...(next === undefined ? {} : { next }),
    }
  }
}
