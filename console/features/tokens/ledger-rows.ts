import { stateInWords } from '#shared/checks/finding-words.ts'
import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'
import type { MeasuredTokens } from './measure-theme.ts'
import type { TokenFilter } from './token-filter.ts'

/** A token as a row: its name parted into the hanging group and the rest. */
export interface LedgerRow {
  readonly token: LedgerTokenWire
  readonly group: string
  /** `.board.fill`; the whole name where it has one segment. */
  readonly rest: string
  readonly standing: StandingWire
  /** Nothing of it has to reach its own line: another member of its group does. */
  readonly isByGroup: boolean
}

export interface LedgerGroup {
  readonly name: string
  readonly rows: readonly LedgerRow[]
}

export function rowsOf(tokens: readonly LedgerTokenWire[], measured?: MeasuredTokens): LedgerRow[] {
  return tokens.map((token) => {
    const [group = token.name] = token.name.split('.', 1)
    const standing = measured?.standings?.get(token.name) ?? token.standing
    return {
      token,
      group,
      rest: token.name.slice(group.length) || token.name,
      standing,
      isByGroup: standing.lowest === null && measured?.byGroup.has(token.id) === true,
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

/** Whether the service's standing says of a token that has pairs neither what is lowest nor that it breaches. */
export function isUnexplained({ standing: { pairs, lowest } }: LedgerTokenWire): boolean {
  return pairs > 0 && lowest === null
}

/** How far over its line; a token that nothing measures comes last. */
function margin({ standing: { lowest } }: LedgerRow): number {
  return lowest === null || lowest.required === 0 ? Infinity : lowest.ratio / lowest.required
}

/** Where it is lowest: `light, rest on hover`; or that it is its group that passes. */
export function placeInWords({ standing: { lowest }, isByGroup }: LedgerRow): string {
  if (lowest === null) return isByGroup ? 'its group passes' : ''
  return `${lowest.theme}, ${stateInWords(lowest.state)}`
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

/** Names to offer where nothing was found, and the start that they share with what was typed. */
export interface NearNames {
  readonly start: string
  readonly names: readonly string[]
}

/** The names that share the longest start with what was typed. */
export function namesNear(tokens: readonly LedgerTokenWire[], named: string): NearNames {
  const typed = named.trim().toLowerCase()
  for (let length = typed.length; length > 0; length--) {
    const start = typed.slice(0, length)
    const near = tokens.filter(({ name }) => name.toLowerCase().startsWith(start))
    if (near.length > 0) return { start, names: near.map(({ name }) => name) }
  }
  return { start: '', names: [] }
}
