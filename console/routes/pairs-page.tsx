import { useSuspenseQuery } from '@tanstack/react-query'
import { useCallback, useEffect, useMemo } from 'react'
import { type LoaderFunctionArgs, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import {
  chosenPairs,
  EVERY_PAIR,
  type PairFilter,
  type PairRowData,
  productsOf,
  readPairFilter,
  writePairFilter,
} from '#console/features/pairs/pair-filter.ts'
import { findingsByPair } from '#console/features/pairs/pair-outcomes.ts'
import { PairSentence } from '#console/features/pairs/pair-sentence.tsx'
import { PairTable } from '#console/features/pairs/pair-table.tsx'
import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { breachSide } from '#console/features/tokens/strip-bands.ts'
import { TokenCell } from '#console/features/tokens/token-cell.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { whereInWords } from '#console/lib/finding-words.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere, Trouble } from '#console/ui/page-states.tsx'
import { countOf } from '#shared/checks/finding-words.ts'
import type { Finding } from '#shared/checks/model.ts'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'
import { PairViews } from './pair-views.tsx'
import { useFrame, useStripBands } from './system-frame.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(pairQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
  ])
  return null
}

/** Themes with a column each; over that many, one column has the lowest of all. */
const MOST_COLUMNS = 3

/** Every declared pair of a system, with what it measures now. */
export function Component() {
  const { system = '' } = useParams()
  const { data: pairs } = useSuspenseQuery(pairQueries.all(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const evaluation = useEvaluation(system, settings.head.revision)
  const measured = useMemo(
    () => evaluation.data && findingsByPair(evaluation.data),
    [evaluation.data],
  )
  const { filter, setFilter } = usePairFilter()
  const rows = useMemo(
    () =>
      chosenPairs(pairs, measured, {
        filter,
        themeId: (key) => themes.find((theme) => theme.key === key)?.id,
      }),
    [pairs, measured, filter, themes],
  )
  return (
    <>
      <title>{`Pairs of ${system} · Dyewright`}</title>
      <PairViews system={system} />
      <PairSentence
        filter={filter}
        products={productsOf(pairs)}
        themes={themes.map(({ key }) => key)}
        tokens={tokens.map(({ name }) => name)}
        onChange={setFilter}
      >
        {rows.length === pairs.length
          ? countOf(pairs.length, 'pair')
          : `${rows.length} of ${countOf(pairs.length, 'pair')}`}
        {measured === undefined && !evaluation.isError && ', being measured'}
      </PairSentence>
      {evaluation.isError && (
        <Trouble title="The pairs cannot be measured here.">
          <p>{evaluation.error.message}</p>
        </Trouble>
      )}
      {rows.length === 0 ? (
        <NoPair isAny={pairs.length > 0} onAll={() => setFilter(EVERY_PAIR)} />
      ) : (
        <FramedPairs system={system} rows={rows} theme={filter.theme} />
      )}
    </>
  )
}

function NoPair({ isAny, onAll }: { isAny: boolean; onAll: () => void }) {
  return isAny ? (
    <NothingHere title="No pair answers to this sentence.">
      <WordButton onClick={onAll}>Show every pair</WordButton>
    </NothingHere>
  ) : (
    <NothingHere title="No pair is declared yet.">
      A pair says what stands on what, and for which use; then it is measured in every theme.
    </NothingHere>
  )
}

/** The table, with the leader of the frame following it. */
function FramedPairs({
  system,
  rows,
  theme,
}: {
  system: string
  rows: readonly PairRowData[]
  theme: string
}) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const names = useModelNames(system)
  const cellOf = useTokenCells(system)
  const { lead } = useFrame()
  const onLead = useCallback((name: string, element: Element) => lead({ name, element }), [lead])
  useEffect(() => () => lead(undefined), [lead])
  return (
    <PairTable
      rows={rows}
      columns={theme === 'all' && themes.length <= MOST_COLUMNS ? themes : []}
      href={(id) => paths.pair(system, id)}
      cellOf={cellOf}
      whereOf={(finding) =>
        whereInWords(names.theme(finding.theme), [
          `${finding.foregroundState}/${finding.backgroundState}`,
        ])
      }
      onLead={onLead}
    />
  )
}

/** A token's cell by its name, cut on the sides of the themes in which these findings breach. */
function useTokenCells(system: string) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { shown } = useStripBands(system)
  const byName = useMemo(() => new Map(tokens.map((token) => [token.name, token])), [tokens])
  return useCallback(
    (name: string, findings: readonly Finding[] = []) => {
      const token = byName.get(name)
      if (token === undefined || shown === undefined) return null
      const breaching = new Set(
        findings.filter(({ outcome }) => outcome === 'breach').map(({ theme }) => theme),
      )
      const keys = themes.filter(({ id }) => breaching.has(id)).map(({ key }) => key)
      return (
        <TokenCell
          name={name}
          resolved={token.resolved}
          shown={shown}
          breach={breachSide(keys, themes, shown)}
          size="line"
        />
      )
    },
    [byName, themes, shown],
  )
}

function usePairFilter() {
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readPairFilter(search), [search])
  const setFilter = (next: PairFilter) =>
    setSearch(writePairFilter(next), { replace: true, preventScrollReset: true })
  return { filter, setFilter }
}
