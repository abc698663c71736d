import type * as z from 'zod'
import { AppError } from './errors.ts'

/** A place in a list as callers get it: not meant to be read, and checked when it comes back. */
export const encodeCursor = (place: unknown): string =>
  Buffer.from(JSON.stringify(place)).toString('base64url')

/** Answers the place that a cursor names, nothing for the first page. */
export function decodeCursor<T>(schema: z.ZodType<T>, cursor: string | undefined): T | undefined {
  if (cursor === undefined) return undefined
  const place = schema.safeParse(readJson(Buffer.from(cursor, 'base64url').toString('utf8')))
  if (place.success) return place.data
  throw new AppError('parameter-invalid', {
    faults: [
      { parameter: 'cursor', detail: 'Take it from the rel="next" link of the page before' },
    ],
  })
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}
