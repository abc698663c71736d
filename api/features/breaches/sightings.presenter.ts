import type { SightingWire } from '#shared/contracts/sightings.contract.ts'
import type { BreachRow } from './breaches.repository.ts'
import type { TokenNames } from './breaches.presenter.ts'
import type { SightingRow } from './sightings.reads.ts'

/** What one branch shows of one identity, and its entry in the log. */
export function presentSighting(
  row: SightingRow,
  names: TokenNames,
  entry: BreachRow | undefined,
): SightingWire {
  return {
    repository: row.repository,
    branch: row.branch,
    protected: row.isProtected,
    foreground: names.get(row.foregroundTokenId) ?? row.names.foreground,
    background: names.get(row.backgroundTokenId) ?? row.names.background,
    kind: row.kind,
    use: row.use,
    theme: row.names.theme,
    state: `${row.fgState}/${row.bgState}`,
    basis: row.basis,
    gating: row.gating,
    ratio: row.ratio,
    required: row.required,
    rendered: { foreground: row.foregroundHex, background: row.backgroundHex },
    firstSeenAt: row.firstSeenAt.toISOString(),
    lastSeenAt: row.lastSeenAt.toISOString(),
    count: row.count,
    ...(row.lastCommit === null ? {} : { lastCommit: row.lastCommit }),
    lastCheck: row.lastCheckId,
    ...(entry === undefined ? {} : { breach: { id: entry.id, number: entry.number } }),
    fingerprint: row.identity,
  }
}
