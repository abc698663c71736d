import { and, asc, desc, eq, gt, lt, or, type SQL, sql } from 'drizzle-orm'
import { breaches } from '#drizzle/schema/breaches.ts'

export type BreachOrder =
  | 'first-seen'
  | '-first-seen'
  | 'shortfall'
  | 'ratio'
  | 'lowest-ratio'
  | '-resolved'
  | 'number'

/** Where a page ended: what its last row was ordered by, and its number. */
export interface BreachPlace {
  readonly value: number
  readonly number: number
}

export interface BreachPage {
  readonly order: BreachOrder
  readonly after: BreachPlace | undefined
  readonly limit: number
}

/**
 * What an order goes by, least first, and then by number. Numbers are taken under the head's lock, so they run in
 * the order of first sight.
 */
const BY: { readonly [order in BreachOrder]?: SQL } = {
  // The part of what is required that is reached: the furthest short has the least.
  shortfall: sql`(${breaches.ratio} / ${breaches.required})`,
  ratio: sql`${breaches.ratio}`,
  'lowest-ratio': sql`${breaches.lowestRatio}`,
  '-resolved': sql`-coalesce(timestampdiff(microsecond, '1970-01-01', ${breaches.resolvedAt}), 0)`,
}

/** What a row is ordered by; 0 where its number is all. */
export const orderedBy = (order: BreachOrder) => (BY[order] ?? sql`0`).mapWith(Number)

export function orderOf(order: BreachOrder): SQL[] {
  const by = BY[order]
  if (by !== undefined) return [asc(by), asc(breaches.number)]
  return [order === '-first-seen' ? desc(breaches.number) : asc(breaches.number)]
}

/** What comes after the page before. */
export function beyond({ order, after }: BreachPage): SQL | undefined {
  if (after === undefined) return undefined
  if (order === '-first-seen') return lt(breaches.number, after.number)
  const later = gt(breaches.number, after.number)
  const by = BY[order]
  if (by === undefined) return later
  // As a double, so that the bound is the very number that the row had.
  const bound = sql`cast(${String(after.value)} as double)`
  return or(gt(by, bound), and(eq(by, bound), later))
}
