import type { SystemAccess } from '#api/caller.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { sha256Hex } from '#api/sha256.ts'
import { measuredBy, uncoveredTokens } from '#shared/checks/coverage.ts'
import { type CoverageWire, MOST_OBSERVED } from '#shared/contracts/coverage.contract.ts'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'
import type { CoverageRepository, ObservedPairRow } from './coverage.repository.ts'
import { missingNames, undeclaredPairs } from './coverage.rules.ts'

export interface CoverageDeps {
  readonly heads: Pick<HeadsService, 'current'>
  readonly reads: { readonly coverage: Pick<CoverageRepository, 'list'> }
}

/** A check that came with pairs of its own. */
export interface ObservedCheck {
  readonly system: SystemAccess
  readonly head: Head
  readonly pairs: readonly PairInput[]
  readonly source: { readonly repository?: string; readonly branch?: string } | undefined
}

/** What nobody measures: tokens in no pair, and pairs that only pipelines know of. */
export function createCoverageService({ heads, reads }: CoverageDeps) {
  return {
    async get(system: SystemAccess): Promise<CoverageWire> {
      const { model, index } = await heads.current(system.id)
      const rows = await reads.coverage.list(system.id)
      const undeclared = new Set(
        undeclaredPairs(
          index,
          rows.map(({ pair }) => pair),
        ),
      )
      return {
        tokens: model.tokens.length,
        uncovered: uncoveredTokens(model).map(({ id, name, deprecated }) => ({
          id,
          name,
          deprecated: deprecated !== undefined,
        })),
        observed: rows
          .filter(({ pair }) => undeclared.has(pair))
          .slice(0, MOST_OBSERVED)
          .map((row) => presentObserved(row, missingNames(index, row.pair))),
      }
    },

    /** Remembers what a pipeline measures and nobody declared. Part of the transaction that keeps the check. */
    async observe(
      { coverage }: { readonly coverage: Pick<CoverageRepository, 'see' | 'sweep'> },
      { system, head, pairs, source }: ObservedCheck,
    ): Promise<void> {
      if (system.caller.kind !== 'key' && source === undefined) return
      const seen = undeclaredPairs(head.index, pairs).map((pair) => ({
        declarationHash: sha256Hex(measuredBy(pair)),
        pair,
      }))
      if (seen.length === 0) return
      const { repository = null, branch = null } = source ?? {}
      await coverage.sweep(system.id)
      await coverage.see({ systemId: system.id, repository, branch }, seen)
    },
  }
}
export type CoverageService = ReturnType<typeof createCoverageService>

function presentObserved(
  { pair, count, firstSeenAt, lastSeenAt, repository, branch }: ObservedPairRow,
  missing: string[],
): CoverageWire['observed'][number] {
  return {
    pair,
    missing,
    count,
    firstSeenAt: firstSeenAt.toISOString(),
    lastSeenAt: lastSeenAt.toISOString(),
    ...(repository === null ? {} : { repository }),
    ...(branch === null ? {} : { branch }),
  }
}
