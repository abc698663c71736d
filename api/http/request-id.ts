import type { RequestHandler, Response } from 'express'
import type { NewId } from '#api/platform/ids.ts'

/** Gives each request an id of ours, which its answer, its problem and its log line carry. */
export const identifyRequests =
  (newId: NewId): RequestHandler =>
  (_request, response, next) => {
    const id = newId('req')
    response.locals.requestId = id
    response.set('X-Request-Id', id)
    next()
  }

/** Answers the id that the request got. */
export const requestIdOf = (response: Response): string => String(response.locals.requestId)
