import type { Request, Response } from 'express'
import type * as z from 'zod'
import type { Caller, SystemAccess } from '#api/caller.ts'
import { AppError, invalidRequest } from '#api/errors.ts'
import type { IfMatch } from '#api/precondition.ts'
import { faultsOf } from '#shared/contracts/faults.ts'
import type { Contract, MediaOf, ParsedOf } from '#shared/contracts/route.ts'
import { preconditionMissing, readIfMatch } from './conditional.ts'
import { parseQuery } from './query.ts'
import { readBody } from './request-body.ts'

/** A request as its handler gets it: parsed, known, allowed. */
export interface Exchange<C extends Contract> extends ParsedOf<C> {
  readonly caller: C['access'] extends 'anyone' ? undefined : Caller
  /** The system of the path; the contract's permission is held in it. */
  readonly system: C['path'] extends `${string}{system}${string}` ? SystemAccess : undefined
  /** Present wherever the contract requires it. */
  readonly ifMatch: C extends { precondition: 'required' } ? IfMatch : IfMatch | undefined
  /** `If-None-Match: *` on a PUT that can create: nothing may stand there yet. */
  readonly createOnly: boolean
  /** What `Accept` chose of JSON and the contract's alternatives. */
  readonly media: MediaOf<C>
  readonly requestId: string
  readonly request: Request
  readonly response: Response
}

const parameterFault = (schema: z.ZodType, given: unknown): unknown => {
  const parsed = schema.safeParse(given)
  if (parsed.success) return parsed.data
  throw new AppError('parameter-invalid', { faults: faultsOf(parsed.error, given, 'parameter') })
}

/** @throws {AppError} `parameter-invalid`, or `not-found` for a file name of another format */
export function readParams(contract: Contract, given: Readonly<Record<string, string>>): unknown {
  if (contract.params === undefined) return undefined
  if (contract.path.endsWith('.{format}') && !contract.params.safeParse(given).success) {
    throw new AppError('not-found', { detail: 'No file of that name and format' })
  }
  return parameterFault(contract.params, given)
}

/** @throws {AppError} `parameter-invalid`, also for a parameter that the operation does not know */
export function readQuery(contract: Contract, request: Request): unknown {
  const mark = request.originalUrl.indexOf('?')
  const given = mark < 0 ? {} : parseQuery(request.originalUrl.slice(mark + 1))
  if (contract.query !== undefined) return parameterFault(contract.query, given)
  const unknown = Object.keys(given)
  if (unknown.length === 0) return undefined
  throw new AppError('parameter-invalid', {
    faults: unknown.map((parameter) => ({ parameter, detail: 'Unknown parameter' })),
  })
}

/** @throws {AppError} what {@link readBody} throws; `request-invalid` with every fault */
export async function readValidBody(
  contract: Contract,
  request: Request,
  response: Response,
): Promise<unknown> {
  if (contract.body === undefined) return undefined
  const given = await readBody(request, response, contract)
  const parsed = contract.body.safeParse(given)
  if (parsed.success) return parsed.data
  throw invalidRequest(faultsOf(parsed.error, given))
}

/** @throws {AppError} `precondition-required` */
export function readPrecondition(contract: Contract, request: Request) {
  const ifNoneMatch = request.headers['if-none-match']
  const ifMatch = readIfMatch(request.headers['if-match'], ifNoneMatch)
  const canCreate = contract.precondition === 'create'
  const createOnly = canCreate && ifMatch === undefined && ifNoneMatch?.trim() === '*'
  if (contract.precondition !== undefined && ifMatch === undefined && !createOnly) {
    throw preconditionMissing(canCreate)
  }
  return { ifMatch, createOnly }
}
