import * as z from 'zod'
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

const REMEMBERED = 5

/** Where a page ended, in a list whose order is that of making. */
export interface PlaceInList {
  readonly id: string
  /** Ids before it, the nearest first: one of them still stands where the last itself was deleted. */
  readonly behind?: readonly string[] | undefined
}

export const placeInListSchema = z.strictObject({
  id: z.string(),
  behind: z.array(z.string()).max(REMEMBERED).optional(),
})

/** The place of the item at a position. */
export const placeAt = (
  items: readonly { readonly id: string }[],
  at: number,
): { id: string; behind: string[] } => ({
  id: items[at]?.id ?? '',
  behind: items
    .slice(Math.max(0, at - REMEMBERED), at)
    .map(({ id }) => id)
    .reverse(),
})

/** Position of the first item after a place; without a trace of it, of the first that was made later. */
export function startBehind(items: readonly { readonly id: string }[], place: PlaceInList): number {
  for (const known of [place.id, ...(place.behind ?? [])]) {
    const at = items.findIndex(({ id }) => id === known)
    if (at >= 0) return at + 1
  }
  const next = items.findIndex(({ id }) => id > place.id)
  return next < 0 ? items.length : next
}
