import { stringify } from 'csv-stringify/sync'
import { truncateRatio } from '#shared/checks/finding-words.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'

const inLog = (ratio: number) => truncateRatio(ratio, 4)

type Cell = string | number | boolean | null | undefined

const COLUMNS: { readonly [header: string]: (breach: BreachWire) => Cell } = {
  number: ({ number }) => number,
  status: ({ status }) => status,
  closingReason: ({ closingReason }) => closingReason,
  origin: ({ origin }) => origin,
  repository: ({ repository }) => repository,
  branch: ({ branch }) => branch,
  foreground: ({ foreground }) => foreground,
  background: ({ background }) => background,
  use: ({ use }) => use,
  theme: ({ theme }) => theme,
  state: ({ state }) => state,
  basis: ({ basis }) => basis,
  gating: ({ gating }) => String(gating),
  ratio: ({ ratio }) => inLog(ratio),
  required: ({ required }) => required,
  lowestRatio: ({ lowestRatio }) => inLog(lowestRatio),
  foregroundColor: ({ rendered }) => rendered.foreground,
  backgroundColor: ({ rendered }) => rendered.background,
  firstSeenAt: ({ firstSeenAt }) => firstSeenAt,
  firstSeenRevision: ({ firstSeenRevision }) => firstSeenRevision,
  lastSeenAt: ({ lastSeenAt }) => lastSeenAt,
  resolvedAt: ({ resolvedAt }) => resolvedAt,
  assignee: ({ assignee }) => assignee?.name,
  id: ({ id }) => id,
}

/**
 * The log as CSV of RFC 4180. A text that a spreadsheet would take for a formula gets an apostrophe before it: names
 * come from people.
 */
export function breachTable(breaches: readonly BreachWire[]): string {
  const cells = Object.values(COLUMNS)
  const rows = breaches.map((breach) => cells.map((cell) => cell(breach) ?? ''))
  return stringify([Object.keys(COLUMNS), ...rows], {
    escape_formulas: true,
    record_delimiter: 'windows',
  })
}
