import { useSuspenseQuery } from '@tanstack/react-query'
import { type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { coverageQueries } from '#console/features/coverage/coverage.queries.ts'
import { ObservedTable } from '#console/features/coverage/observed-table.tsx'
import { UncoveredTable } from '#console/features/coverage/uncovered-table.tsx'
import { writePairAddress } from '#console/features/pairs/pair-address.ts'
import { wordsOfUse } from '#console/features/pairs/pair-words.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { CoverageWire } from '#shared/contracts/coverage.contract.ts'
import { PairViews } from './pair-views.tsx'
import { useTokenCells } from './token-cells.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(coverageQueries.one(system))
  return null
}

/** What no declared pair measures: tokens that stand in none, and pairs that pipelines alone know. */
export function Component() {
  const { system = '' } = useParams()
  const { data: coverage } = useSuspenseQuery(coverageQueries.one(system))
  const cellOf = useTokenCells(system)
  const { uncovered, observed } = coverage
  return (
    <>
      <title>{`Coverage of ${system} · Dyewright`}</title>
      <PairViews system={system} />
      <h2 className="pt-22 text-16 font-semibold">Tokens in no pair</h2>
      <p role="status" className="max-w-720 pt-6 pb-14 text-ink-soft">
        {uncoveredInWords(coverage)}
      </p>
      {uncovered.length > 0 && (
        <UncoveredTable
          tokens={uncovered}
          cellOf={cellOf}
          href={(name) => paths.token(system, name)}
          declareHref={(foreground) => paths.newPair(system, writePairAddress({ foreground }))}
        />
      )}
      <h2 className="pt-32 text-16 font-semibold">Pairs that nobody declared</h2>
      <p className="max-w-720 pt-6 pb-14 text-ink-soft">{observedInWords(observed.length)}</p>
      {observed.length > 0 && (
        <ObservedTable
          observed={observed}
          useInWords={wordsOfUse}
          declareHref={(pair) => paths.newPair(system, writePairAddress(pair))}
        />
      )}
    </>
  )
}

function uncoveredInWords({ tokens, uncovered }: CoverageWire): string {
  if (uncovered.length === 0) {
    return `Every one of ${countOf(tokens, 'token')} is in a pair, or a token that follows it is.`
  }
  const are = uncovered.length === 1 ? 'is' : 'are'
  return `${startSentence(countOf(uncovered.length, 'token'))} of ${tokens} ${are} in no pair, and no token that follows one is: nothing is measured when such a colour moves.`
}

function observedInWords(count: number): string {
  return count === 0
    ? 'In 30 days no pipeline has sent a pair that is not declared here.'
    : `Within 30 days pipelines sent ${countOf(count, 'pair')} of their own that ${count === 1 ? 'is' : 'are'} not declared here, so that only they measure ${count === 1 ? 'it' : 'them'}.`
}
