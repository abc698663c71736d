import type { ErrorRequestHandler, RequestHandler } from 'express'
import { AppError } from '#api/errors.ts'
import type { Logger } from '#api/platform/logger.ts'
import { PROBLEMS } from '#shared/contracts/problems.ts'
import { refusalOf, sendProblem } from './problem.ts'
import { requestIdOf } from './request-id.ts'

export interface ErrorHandling {
  readonly logger: Logger
  /** What the database's own errors come to: `service-unavailable`, or an error without values. */
  readonly translate: (error: unknown) => unknown
}

/** Whatever no route took. */
export const refuseUnknownPath: RequestHandler = (_request, _response, next) => {
  next(new AppError('not-found'))
}

/** Express itself refuses a path whose percent-encoding is broken, with a status on its error. */
const isUnreadablePath = (error: unknown): boolean =>
  error instanceof URIError || (error as { status?: unknown } | null)?.status === 400

/** Ends every request that failed with a problem document; what nobody foresaw is logged with its cause. */
export const handleErrors =
  ({ logger, translate }: ErrorHandling): ErrorRequestHandler =>
  (thrown, _request, response, _next) => {
    const error = translate(thrown)
    const refusal = isUnreadablePath(error)
      ? new AppError('request-unreadable', { detail: 'The address cannot be decoded' })
      : refusalOf(error)
    if (PROBLEMS[refusal.code].status >= 500) {
      const log = refusal.code === 'server-unexpected' ? 'error' : 'warn'
      logger[log](
        { requestId: requestIdOf(response), err: refusal.options.cause ?? refusal },
        refusal.code,
      )
    }
    if (response.headersSent) response.destroy()
    else sendProblem(response, refusal)
  }
