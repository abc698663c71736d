import { type Fault, PROBLEMS, type ProblemCode } from '#shared/contracts/problems.ts'

export interface RefusalOptions {
  /** What a person needs to know of this one refusal. */
  readonly detail?: string
  /** Everything that is wrong with the request, not the first of it. */
  readonly faults?: readonly Fault[]
  /** Further members of the problem document, for example `current` of a 412. */
  readonly extra?: Readonly<Record<string, unknown>>
  readonly retryAfterSeconds?: number
  readonly cause?: unknown
}

/** A refusal. It knows its code and never a status; `api/http/problem.ts` writes it down. */
export class AppError extends Error {
  override readonly name = 'AppError'
  readonly code: ProblemCode
  readonly options: RefusalOptions

  constructor(code: ProblemCode, options: RefusalOptions = {}) {
    super(options.detail ?? PROBLEMS[code].title, { cause: options.cause })
    this.code = code
    this.options = options
  }
}

/** A body that was read and refused, with all its faults. */
export const invalidRequest = (faults: readonly Fault[]): AppError =>
  new AppError('request-invalid', { faults })
