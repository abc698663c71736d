import type { Request } from 'express'
import { AppError } from '#api/errors.ts'
import type { Contract } from '#shared/contracts/route.ts'

const JSON_MEDIA = 'application/json'

/**
 * What the caller is answered in: of JSON and the contract's alternatives the one that `Accept` prefers, JSON
 * in a tie of wildcards. A browser's Accept asks for a page, or for XML, before JSON: it gets JSON.
 * @throws {AppError} `not-acceptable`, where the contract lists it
 * @see https://www.rfc-editor.org/rfc/rfc9110#section-12.5.1
 */
export function negotiate(contract: Contract, request: Request): string {
  if (!contract.problems.includes('not-acceptable')) return JSON_MEDIA
  if (request.accepts().some((range) => range.toLowerCase() === 'text/html')) return JSON_MEDIA
  const given = [JSON_MEDIA, ...(contract.alternatives ?? []).map(({ media }) => media)]
  const chosen = request.accepts(given)
  if (chosen !== false) return chosen
  throw new AppError('not-acceptable', { detail: `It can be given as ${given.join(' or ')}` })
}
