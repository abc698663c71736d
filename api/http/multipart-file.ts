import type { Request, Response } from 'express'
import multer, { MulterError } from 'multer'
import { AppError, invalidRequest } from '#api/errors.ts'

/** A file as a form sent it. */
export interface UploadedFile {
  /** What the sender calls it; nothing is ever written under this name. */
  readonly name: string
  /** Media type of its part, lower case, without parameters. */
  readonly type: string
  readonly bytes: Uint8Array
}

/** The field of a form that holds the file. */
export const FILE_FIELD = 'file'
/** What boundary and part header may add to the file. */
const FRAME_BYTES = 2 ** 16
const ONE_FILE = `The form holds one file, in the field "${FILE_FIELD}", and nothing else`

/** Whether the body is a form that can carry a file. @see https://www.rfc-editor.org/rfc/rfc7578 */
export const isForm = (request: Request): boolean =>
  /^multipart\/form-data\s*(;|$)/i.test(request.headers['content-type'] ?? '')

/**
 * Answers the one file of a form, held in memory and nowhere else.
 * @param limitBytes what the file may have at most
 * @throws {AppError} `request-too-large`; `request-unreadable` for a form that is broken; `request-invalid` for one
 *   that holds something else; `media-type-unsupported` for a compressed one
 * @see https://www.rfc-editor.org/rfc/rfc7578
 */
export async function readFormFile(
  request: Request,
  response: Response,
  limitBytes: number,
): Promise<UploadedFile> {
  refuseEncoded(request)
  const announced = Number(request.headers['content-length'] ?? 0)
  if (announced > limitBytes + FRAME_BYTES) throw tooLarge(limitBytes)
  await runUpload(request, response, limitBytes)
  const { file } = request
  if (file === undefined) throw invalidRequest([{ pointer: '', detail: ONE_FILE }])
  return {
    name: Buffer.from(file.originalname, 'latin1').toString('utf8'),
    type: file.mimetype.toLowerCase(),
    bytes: file.buffer,
  }
}

function refuseEncoded(request: Request): void {
  if ((request.headers['content-encoding'] ?? 'identity') === 'identity') return
  throw new AppError('media-type-unsupported', {
    faults: [{ parameter: 'Content-Encoding', detail: 'Send the form uncompressed' }],
  })
}

function runUpload(request: Request, response: Response, limitBytes: number): Promise<void> {
  const upload = multer({
    storage: multer.memoryStorage(),
    limits: {
      fileSize: limitBytes,
      files: 1,
      fields: 0,
      parts: 1,
      headerPairs: 16,
      fieldNameSize: 100,
    },
  }).single(FILE_FIELD)
  return new Promise((resolve, reject) => {
    void upload(request, response, (error?: unknown) => {
      if (error === undefined || error === null) resolve()
      else reject(refusalOf(error, limitBytes))
    })
  })
}

function refusalOf(error: unknown, limitBytes: number): AppError {
  if (!(error instanceof MulterError)) {
    return new AppError('request-unreadable', {
      detail:
        'The form is broken: its parts cannot be told apart, or it ends before its last boundary',
      cause: error,
    })
  }
  if (error.code === 'LIMIT_FILE_SIZE') return tooLarge(limitBytes)
  return invalidRequest([{ pointer: '', detail: ONE_FILE }])
}

const tooLarge = (limitBytes: number): AppError =>
  new AppError('request-too-large', {
    detail: `At most ${limitBytes / 2 ** 20} MiB`,
    extra: { limitBytes },
  })
