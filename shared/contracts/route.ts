import type * as z from 'zod'
import type { Permission } from './permissions.ts'
import { GENERAL_PROBLEMS, IDEMPOTENCY_PROBLEMS, type ProblemCode } from './problems.ts'

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'

/** Who may call: anyone, anyone known (session or key), or the holders of one permission. */
export type Access = 'anyone' | 'known' | Permission

/** A successful answer: JSON of one shape, text of some media types, or nothing. */
export type Success =
  | { readonly status: 200 | 201 | 202; readonly body: z.ZodType; readonly example: unknown }
  | {
      readonly status: 200
      readonly media: readonly string[]
      /** What the text says, where it is JSON; else any text. */
      readonly body: z.ZodType
      readonly example: unknown
    }
  | { readonly status: 204; readonly body?: undefined }

/** Another form of a success than JSON, for whoever asks for it by `Accept`. */
export interface Alternative {
  readonly media: string
  readonly body: z.ZodType
  readonly example: unknown
}

/**
 * One operation, said once: the router mounts it, the document describes it, the client calls it and the
 * guard tests attack it.
 */
export interface Contract {
  /** Equals the export's and the test file's name. */
  readonly operationId: string
  readonly method: Method
  /** OpenAPI template, `/v1/systems/{system}/tokens`. */
  readonly path: string
  /** The feature's word; groups the document. */
  readonly feature: string
  readonly summary: string
  readonly description?: string
  readonly params?: z.ZodObject
  readonly query?: z.ZodObject
  readonly body?: z.ZodType
  /** Example of the body, and of each query parameter that an example needs. */
  readonly bodyExample?: unknown
  /** What the body may have at most, default 1 MiB. */
  readonly maxBodyBytes?: number
  /** The body may also come as the one file of a form: JSON as it is, a style sheet as text. */
  readonly takesFile?: boolean
  readonly success: Success
  /** Long work answers 202 with this and the address to ask at, instead of its success. */
  readonly deferred?: { readonly body: z.ZodType; readonly example: unknown }
  /** JSON is answered where `Accept` prefers none of them, or names `text/html`; 406 where it excludes all. */
  readonly alternatives?: readonly Alternative[]
  readonly problems: readonly ProblemCode[]
  readonly access: Access
  /** What pays for a request: theme reads have a budget of their own, leased in blocks; default is that of calls. */
  readonly budget?: 'theme-reads' | 'none'
  /**
   * `required`: 428 without If-Match. `create`: PUT that makes with `If-None-Match: *` and answers 201, or
   * replaces with If-Match and answers its success. @see https://www.rfc-editor.org/rfc/rfc9110#section-9.3.4
   */
  readonly precondition?: 'required' | 'create'
  /** The answer carries a strong ETag and `If-None-Match` is honoured with 304. */
  readonly conditional?: boolean
  /** Members of the answer that are shown once: a repetition with the same Idempotency-Key is answered without them. */
  readonly secrets?: readonly string[]
}

/**
 * Whether `Idempotency-Key` is honoured: on every POST of somebody known. A key is its caller's, and where anyone
 * may call there is none.
 */
export const takesIdempotencyKey = ({ method, access }: Pick<Contract, 'method' | 'access'>) =>
  method === 'POST' && access !== 'anyone'

/** Every code that an operation can be refused with. */
export const problemsOf = (contract: Contract): ProblemCode[] => [
  ...new Set<ProblemCode>([
    ...contract.problems,
    ...GENERAL_PROBLEMS,
    ...(contract.budget === 'none' ? [] : (['rate-limited'] as const)),
    ...(takesIdempotencyKey(contract) ? IDEMPOTENCY_PROBLEMS : []),
  ]),
]

/** Keeps the literal types of a contract while checking its shape. */
export function defineContract<const C extends Contract>(contract: C): C {
  return contract
}

/**
 * Answers the address of an operation: its path with the parameters filled in, percent-encoded.
 * @see https://www.rfc-editor.org/rfc/rfc3986#section-2.1
 */
export const addressOf = (
  { path }: Pick<Contract, 'path'>,
  params: Readonly<Record<string, unknown>> = {},
): string =>
  path.replace(/\{(\w+)\}/g, (_, name: string) => encodeURIComponent(String(params[name])))

type Part<C, K extends string, Out extends 'input' | 'output'> =
  C extends Record<K, infer S extends z.ZodType>
    ? Out extends 'input'
      ? z.input<S>
      : z.output<S>
    : undefined

/** What a caller hands in. */
export type InputOf<C extends Contract> = (C extends { params: z.ZodObject }
  ? { params: Part<C, 'params', 'input'> }
  : { params?: undefined }) &
  (C extends { query: z.ZodObject }
    ? { query?: Part<C, 'query', 'input'> }
    : { query?: undefined }) &
  (C extends { body: z.ZodType } ? { body: Part<C, 'body', 'input'> } : { body?: undefined }) &
  (C extends { precondition: 'required' }
    ? { ifMatch: string }
    : C extends { precondition: 'create' }
      ? { ifMatch?: string; ifNoneMatch?: '*' }
      : { ifMatch?: undefined }) &
  (C extends { method: 'POST' } ? { idempotencyKey?: string } : { idempotencyKey?: undefined })

/** What a handler receives after parsing. */
export interface ParsedOf<C extends Contract> {
  readonly params: Part<C, 'params', 'output'>
  readonly query: Part<C, 'query', 'output'>
  readonly body: Part<C, 'body', 'output'>
}

/** What a caller gets back; `undefined` for 204. Where work may be deferred the status tells which it is. */
export type OutputOf<C extends Contract> =
  | (C['success'] extends { media: readonly string[] }
      ? string
      : C['success'] extends { body: infer S extends z.ZodType }
        ? z.output<S>
        : undefined)
  | (C extends { deferred: { body: infer D extends z.ZodType } } ? z.output<D> : never)

/** The media types a caller of the operation can be answered in. */
export type MediaOf<C extends Contract> =
  | 'application/json'
  | (C extends { alternatives: readonly (infer A extends Alternative)[] } ? A['media'] : never)

/** What a handler must answer. */
export type AnswerOf<C extends Contract> = C['success'] extends { body: infer S extends z.ZodType }
  ? z.input<S>
  : undefined
