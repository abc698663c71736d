import type { StandingWire } from '#shared/contracts/tokens.contract.ts'

/** What the list of tokens can be narrowed to. */
export interface LedgerFilter {
  /** Part of a name, in any case. */
  readonly named?: string | undefined
  /** First name segment. */
  readonly group?: string | undefined
  readonly mark?: NonNullable<StandingWire['mark']> | 'none' | undefined
}

export const LEDGER_SORTS = ['ledger', 'name', 'lowest'] as const
export type LedgerSort = (typeof LEDGER_SORTS)[number]

/** A token as the list sees it, in ledger order. */
export interface LedgerEntry {
  readonly id: string
  readonly name: string
  readonly standing: StandingWire
}

/** Narrows and sorts the ledger. */
export function selectEntries<Entry extends LedgerEntry>(
  entries: readonly Entry[],
  { named, group, mark }: LedgerFilter,
  sort: LedgerSort,
): Entry[] {
  const part = named?.toLocaleLowerCase('en')
  const found = entries.filter(
    ({ name, standing }) =>
      (part === undefined || name.toLocaleLowerCase('en').includes(part)) &&
      (group === undefined || name.split('.', 1)[0] === group) &&
      (mark === undefined || (standing.mark ?? 'none') === mark),
  )
  if (sort === 'name') return found.sort((a, b) => (a.name < b.name ? -1 : 1))
  if (sort === 'lowest') return found.sort((a, b) => shortfall(a) - shortfall(b))
  return found
}

/** Furthest short first; what requires nothing, or is in no pair, last. */
export function shortfall({ standing: { lowest } }: LedgerEntry): number {
  return lowest && lowest.required > 0 ? lowest.ratio / lowest.required : Number.POSITIVE_INFINITY
}
