import { type PlaceInList, placeAt, startBehind } from '#api/paging.ts'
import { type LedgerEntry, type LedgerSort, shortfall } from './ledger.rules.ts'

/** Where a page of the list ended; it holds although that token is deleted, renamed or edited meanwhile. */
export interface LedgerPlace extends PlaceInList {
  readonly name: string
  /** `null` where nothing is required of it. */
  readonly shortfall: number | null
}

/** The place of the entry at a position. */
export function placeOf(entries: readonly LedgerEntry[], at: number): LedgerPlace | undefined {
  const entry = entries[at]
  if (entry === undefined) return undefined
  const short = shortfall(entry)
  return {
    ...placeAt(entries, at),
    name: entry.name,
    shortfall: Number.isFinite(short) ? short : null,
  }
}

/**
 * Position of the first entry after a place. Where names or ratios order the list, the place is what it was when
 * the page was given, wherever its token stands by now; among equals, and in the ledger, it is the token itself,
 * or the nearest before it that still stands.
 */
export function startAfter(
  entries: readonly LedgerEntry[],
  place: LedgerPlace,
  sort: LedgerSort,
): number {
  if (sort === 'ledger') return startBehind(entries, place)
  if (sort === 'name') return firstOf(entries, ({ name }) => name > place.name)
  const short = place.shortfall ?? Number.POSITIVE_INFINITY
  const equals = entries.filter((entry) => shortfall(entry) === short)
  const next = equals[startBehind(equals, place)]
  return firstOf(entries, (entry) => entry === next || shortfall(entry) > short)
}

function firstOf(
  entries: readonly LedgerEntry[],
  isWanted: (entry: LedgerEntry) => boolean,
): number {
  const at = entries.findIndex(isWanted)
  return at < 0 ? entries.length : at
}
