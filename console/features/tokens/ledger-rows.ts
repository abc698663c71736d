import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'
import type { TokenFilter } from './token-filter.ts'

/** A token as a row: its name parted into the hanging group and the rest. */
export interface LedgerRow {
  readonly token: LedgerTokenWire
  readonly group: string
  /** `.board.fill`; the whole name where it has one segment. */
  readonly rest: string
  readonly standing: StandingWire
}

export interface LedgerGroup {
  readonly name: string
  readonly rows: readonly LedgerRow[]
}

export function rowsOf(
  tokens: readonly LedgerTokenWire[],
  standings?: ReadonlyMap<string, StandingWire>,
): LedgerRow[] {
  return tokens.map((token) => {
    const [group = token.name] = token.name.split('.', 1)
    return {
      token,
      group,
      rest: token.name.slice(group.length) || token.name,
      standing: standings?.get(token.name) ?? token.standing,
    }
  })
}

/** The rows that the sentence asks for, in its order. */
export function chosenRows(rows: readonly LedgerRow[], filter: TokenFilter): LedgerRow[] {
  const named = filter.named.trim().toLowerCase()
  const chosen = rows.filter(
    (row) =>
      (filter.group === 'all' || row.group === filter.group) &&
      hasMark(row.standing, filter.mark) &&
      row.token.name.toLowerCase().includes(named),
  )
  if (filter.order === 'name') {
    return chosen.sort((a, b) => (a.token.name < b.token.name ? -1 : 1))
  }
  return filter.order === 'short' ? chosen.sort((a, b) => margin(a) - margin(b)) : chosen
}

function hasMark(standing: StandingWire, mark: TokenFilter['mark']): boolean {
  if (mark === 'any') return true
  if (mark === 'none') return standing.mark === null
  if (mark === 'breach') return standing.mark === 'breach' || standing.mark === 'breach-on-it'
  return standing.mark === mark
}

/** How far over its line; a token that nothing measures comes last. */
function margin({ standing: { lowest } }: LedgerRow): number {
  return lowest === null || lowest.required === 0 ? Infinity : lowest.ratio / lowest.required
}

/** Rows that follow each other under one group name. */
export function groupRows(rows: readonly LedgerRow[]): LedgerGroup[] {
  const groups: { name: string; rows: LedgerRow[] }[] = []
  for (const row of rows) {
    const last = groups.at(-1)
    if (last?.name === row.group) last.rows.push(row)
    else groups.push({ name: row.group, rows: [row] })
  }
  return groups
}

/** Names that begin with what was typed before its last segment, to offer where nothing was found. */
export function namesNear(tokens: readonly LedgerTokenWire[], named: string): string[] {
  const typed = named.trim().toLowerCase()
  for (let length = typed.length; length > 0; length--) {
    const start = typed.slice(0, length)
    const near = tokens.filter(({ name }) => name.toLowerCase().startsWith(start))
    if (near.length > 0) return near.map(({ name }) => name)
  }
  return []
}
