import type { Request, Response } from 'express'
import type * as z from 'zod'
import { sha256Hex } from '#api/sha256.ts'
import type { Alternative, AnswerOf, Contract } from '#shared/contracts/route.ts'
import { isUnmodified } from './conditional.ts'

interface Accompanied {
  /** Strong validator; without it the `etag` member of the body is the one. */
  readonly etag?: string
  readonly headers?: Readonly<Record<string, string | readonly string[]>>
}

/** 201 says where that is which was made; a PUT that can make says it where it did. */
type Located<C extends Contract> = C['success'] extends { status: 201 }
  ? { readonly location: string }
  : C extends { precondition: 'create' }
    ? { readonly location?: string | undefined }
    : unknown

/** Another form of the body, as one of the contract's alternatives describes it. */
type Alternate<C extends Contract> = C extends {
  alternatives: readonly (infer A extends Alternative)[]
}
  ? Accompanied & { readonly body: object; readonly media: A['media'] }
  : never

/** Work that was taken on and is not done yet, with the address to ask at. */
type Deferred<C extends Contract> = C extends { deferred: { body: infer D extends z.ZodType } }
  ? Accompanied & { readonly status: 202; readonly body: z.input<D>; readonly location: string }
  : never

/** What a handler answers: JSON, text of one of the contract's media types, or nothing. */
export type Answer<C extends Contract> = C['success'] extends { status: 204 }
  ? undefined | Accompanied
  : C['success'] extends { media: readonly string[] }
    ? Accompanied & { readonly text: string; readonly media: string }
    :
        | Alternate<C>
        | Deferred<C>
        | (Accompanied &
            Located<C> & {
              readonly body: AnswerOf<C>
              /** Cursor of the next page, where there is one. */
              readonly next?: string | undefined
            })

/** An answer whatever its contract. */
export interface LooseAnswer extends Accompanied {
  /** Only where it is neither the contract's own nor told by `location`. */
  readonly status?: 202 | undefined
  readonly body?: unknown
  readonly text?: string
  readonly media?: string
  readonly next?: string | undefined
  readonly location?: string | undefined
}

/** The answer is not what the contract says: a bug, found by a test. */
const contradiction = (contract: Contract, what: string): Error =>
  new Error(`${contract.operationId} answers what its contract does not say: ${what}`)

/** @throws {Error} where the answer contradicts its contract */
export function checkAnswer(contract: Contract, answer: LooseAnswer | undefined): void {
  const { success, deferred } = contract
  if (answer?.status === 202) {
    const parsed = deferred?.body.safeParse(answer.body)
    if (parsed?.success) return
    throw contradiction(contract, parsed?.error.message ?? 'it never defers its work')
  }
  if (success.status === 204) return
  if ('media' in success) {
    if (typeof answer?.text !== 'string') throw contradiction(contract, 'no text')
    if (!success.media.includes(answer.media ?? ''))
      throw contradiction(contract, `${answer.media}`)
    return
  }
  const other = contract.alternatives?.find(({ media }) => media === answer?.media)
  const parsed = (other ?? success).body.safeParse(answer?.body)
  if (!parsed.success) throw contradiction(contract, parsed.error.message)
}

/** Sends a success, or 304 where the caller has it already. */
export function sendAnswer(
  request: Request,
  response: Response,
  contract: Contract,
  answer: LooseAnswer | undefined,
): void {
  const { success } = contract
  response.set('Cache-Control', contract.conditional ? 'private, no-cache' : 'no-store')
  response.vary('Authorization, Cookie')
  if (contract.alternatives !== undefined) response.vary('Accept')
  for (const [name, value] of Object.entries(answer?.headers ?? {})) {
    response.setHeader(name, typeof value === 'string' ? value : [...value])
  }
  if (success.status === 204) {
    response.status(204).end()
    return
  }
  const text = answer?.text ?? JSON.stringify(answer?.body)
  const etag = etagFor(contract, answer, text)
  if (etag !== undefined) response.set('ETag', etag)
  if (answer?.next !== undefined) response.set('Link', nextLink(request, answer.next))
  if (contract.conditional && isUnmodified(request.headers['if-none-match'], etag ?? '')) {
    response.status(304).end()
    return
  }
  if (answer?.location !== undefined) response.set('Location', answer.location)
  response
    .status(statusOf(contract, answer))
    .set('Content-Type', answer?.media ?? 'application/json; charset=utf-8')
    .end(request.method === 'HEAD' ? undefined : text)
}

/** 201 where something was made whose address is told. */
export const statusOf = ({ success }: Contract, answer: LooseAnswer | undefined): number =>
  answer?.status ?? (answer?.location === undefined ? success.status : 201)

function etagFor(
  contract: Contract,
  answer: LooseAnswer | undefined,
  text: string,
): string | undefined {
  const member = (answer?.body as { etag?: unknown } | undefined)?.etag
  const own = answer?.etag ?? (typeof member === 'string' ? member : undefined)
  if (own !== undefined || !contract.conditional) return own
  return `"${sha256Hex(text).slice(0, 32)}"`
}

/** @see https://www.rfc-editor.org/rfc/rfc8288 */
function nextLink(request: Request, cursor: string): string {
  const url = new URL(request.originalUrl, 'http://localhost')
  url.searchParams.set('cursor', cursor)
  return `<${url.pathname}${url.search}>; rel="next"`
}
