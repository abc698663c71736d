import type { Response } from 'express'
import { AppError } from '#api/errors.ts'
import { type Fault, type Problem, PROBLEMS } from '#shared/contracts/problems.ts'
import { requestIdOf } from './request-id.ts'

/** Answers the problem document of a refusal. */
export function problemOf(refusal: AppError, requestId: string): Problem {
  const { status, title } = PROBLEMS[refusal.code]
  const { detail, faults = [], extra } = refusal.options
  const errors = shownFaults(faults)
  const more = faults.length - errors.length
  return {
    type: `/problems/${refusal.code}`,
    title,
    status,
    ...(detail === undefined ? {} : { detail }),
    ...(refusal.options.faults === undefined ? {} : { errors }),
    ...(more > 0 ? { more } : {}),
    ...extra,
    requestId,
  }
}

const MOST_FAULTS = 100
const MOST_CHARACTERS = 100_000

/** The first faults, so many that an answer does not outgrow its request by far. */
function shownFaults(faults: readonly Fault[]): Fault[] {
  let characters = 0
  return faults.slice(0, MOST_FAULTS).filter(({ pointer = '', detail }, at) => {
    characters += pointer.length + detail.length
    return at === 0 || characters <= MOST_CHARACTERS
  })
}

/**
 * Sends a refusal; nothing else in the service writes a problem document.
 * @see https://www.rfc-editor.org/rfc/rfc9457
 */
export function sendProblem(response: Response, refusal: AppError): void {
  const { status } = PROBLEMS[refusal.code]
  const { retryAfterSeconds } = refusal.options
  if (retryAfterSeconds !== undefined) response.set('Retry-After', String(retryAfterSeconds))
  if (status === 401) response.set('WWW-Authenticate', 'Bearer realm="dyewright"')
  response.removeHeader('ETag')
  response
    .status(status)
    .set('Cache-Control', 'no-store')
    .type('application/problem+json')
    .send(JSON.stringify(problemOf(refusal, requestIdOf(response))))
}

/** Whatever went wrong, as a refusal: what nobody foresaw keeps its cause for the log alone. */
export const refusalOf = (error: unknown): AppError =>
  error instanceof AppError ? error : new AppError('server-unexpected', { cause: error })
