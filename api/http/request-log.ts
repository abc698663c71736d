import { performance } from 'node:perf_hooks'
import type { RequestHandler } from 'express'
import { type Caller, actorOf } from '#api/caller.ts'
import type { Logger } from '#api/platform/logger.ts'
import { requestIdOf } from './request-id.ts'

/** Writes one line a request: never a header, a query or a body, for there the secrets are. */
export const logRequests =
  (logger: Logger): RequestHandler =>
  (request, response, next) => {
    const startedMs = performance.now()
    response.once('close', () => {
      const caller = response.locals.caller as Caller | undefined
      logger.info({
        requestId: requestIdOf(response),
        method: request.method,
        path: request.originalUrl.split('?', 1)[0],
        status: response.statusCode,
        ms: Math.round(performance.now() - startedMs),
        ...(caller === undefined ? {} : { caller: actorOf(caller).id }),
        ...(response.writableFinished ? {} : { aborted: true }),
      })
    })
    next()
  }
