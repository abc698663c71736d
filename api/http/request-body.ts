import express, { type Request, type Response } from 'express'
import { AppError } from '#api/errors.ts'
import type { Contract } from '#shared/contracts/route.ts'
import { readJsonBody, readText } from './json-body.ts'
import { isForm, readFormFile, type UploadedFile } from './multipart-file.ts'

/** What a body may have at most unless its contract says otherwise: 1 MiB. */
export const BODY_LIMIT_BYTES = 2 ** 20

const JSON_TYPE = /^application\/(?:json|[\w.!#$&^-]+\+json)$/i

/**
 * Answers the JSON value of the request's body. Type, size and encoding are judged before it is parsed, depth
 * and count before anything validates it.
 * @throws {AppError} `media-type-unsupported`, `request-too-large`, `request-unreadable`
 */
export async function readBody(
  request: Request,
  response: Response,
  contract: Contract,
): Promise<unknown> {
  const limit = contract.maxBodyBytes ?? BODY_LIMIT_BYTES
  if (contract.takesFile && isForm(request)) {
    return contentOf(await readFormFile(request, response, limit), limit)
  }
  refuseOtherTypes(request)
  const bytes = await readBytes(request, response, limit)
  return readJsonBody(bytes, limit)
}

/** A style sheet is its text; anything else is read as JSON, whatever type its sender gave it. */
const contentOf = ({ name, type, bytes }: UploadedFile, limit: number): unknown =>
  type === 'text/css' || /\.css$/i.test(name) ? readText(bytes) : readJsonBody(bytes, limit)

function refuseOtherTypes(request: Request): void {
  const [type = '', ...parameters] = (request.headers['content-type'] ?? '').split(';')
  const charset = /charset="?([^"\s]+)/i.exec(parameters.join(';'))?.[1] ?? 'utf-8'
  if (JSON_TYPE.test(type.trim()) && /^utf-?8$/i.test(charset)) return
  throw new AppError('media-type-unsupported', {
    detail: 'Send application/json, in UTF-8',
    faults: [{ parameter: 'Content-Type', detail: 'Expected application/json' }],
  })
}

interface BodyFailure {
  readonly type?: string
  readonly status?: number
}

function readBytes(request: Request, response: Response, limit: number): Promise<Uint8Array> {
  const read = express.raw({ type: () => true, limit, inflate: false })
  return new Promise((resolve, reject) => {
    read(request, response, (error?: unknown) => {
      if (error !== undefined) reject(bodyRefusal(error as BodyFailure, limit))
      else resolve(request.body instanceof Uint8Array ? request.body : new Uint8Array())
    })
  })
}

function bodyRefusal(failure: BodyFailure, limit: number): AppError {
  switch (failure.type) {
    case 'entity.too.large':
      return new AppError('request-too-large', {
        detail: `At most ${limit / 2 ** 20} MiB`,
        extra: { limitBytes: limit },
      })
    case 'encoding.unsupported':
      return new AppError('media-type-unsupported', {
        faults: [{ parameter: 'Content-Encoding', detail: 'Send the body uncompressed' }],
      })
    default:
      return new AppError('request-unreadable', {
        detail: 'The body broke off or is not as long as announced',
        cause: failure,
      })
  }
}
