import type { Request, RequestHandler, Response } from 'express'
import { AppError } from '#api/errors.ts'

/**
 * Answers OPTIONS, and refuses what an address does not take; either way `Allow` says what it does.
 * @throws {AppError} `method-not-allowed`
 * @see https://www.rfc-editor.org/rfc/rfc9110#section-9.3.7
 */
export function answerOtherMethod(
  request: Request,
  response: Response,
  methods: readonly string[],
): void {
  const allowed = [...new Set([...methods, 'OPTIONS'])].sort().join(', ')
  response.set('Allow', allowed)
  if (request.method === 'OPTIONS') response.status(204).end()
  else throw new AppError('method-not-allowed', { detail: `It takes ${allowed}` })
}

/** Lets GET and HEAD through, for what is only read. */
export const onlyReads: RequestHandler = (request, response, next) => {
  if (request.method === 'GET' || request.method === 'HEAD') next()
  else answerOtherMethod(request, response, ['GET', 'HEAD'])
}
