import { useSuspenseQuery } from '@tanstack/react-query'
import { useCallback, useEffect, useMemo, useRef } from 'react'
import { type LoaderFunctionArgs, useLocation, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import {
  chosenRows,
  type LedgerRow,
  namesNear,
  rowsOf,
} from '#console/features/tokens/ledger-rows.ts'
import { NoTokenFound, NoTokenYet } from '#console/features/tokens/no-tokens.tsx'
import {
  EVERY_TOKEN,
  readTokenFilter,
  type TokenFilter,
  writeTokenFilter,
} from '#console/features/tokens/token-filter.ts'
import { TokenLedger } from '#console/features/tokens/token-ledger.tsx'
import { TokenSentence } from '#console/features/tokens/token-sentence.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { Waiting } from '#console/ui/page-states.tsx'
import type { LedgerTokenWire } from '#shared/contracts/tokens.contract.ts'
import { useFrame, useStripBands } from './system-frame.tsx'
import { useMeasuredTokens } from './theme-standings.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(tokenQueries.ledger(system))
  return null
}

export function Component() {
  const { system = '' } = useParams()
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { filter, setFilter } = useTokenFilter()
  const measured = useMeasuredTokens(system, filter.theme)
  const rows = useMemo(() => rowsOf(tokens, measured.data), [tokens, measured.data])
  const chosen = useMemo(() => chosenRows(rows, filter), [rows, filter])
  const field = useFindField()
  if (tokens.length === 0) return <NoTokenYet importHref={paths.importFile(system)} />
  return (
    <>
      <title>{`Tokens of ${system} · Dyewright`}</title>
      <TokenSentence
        filter={filter}
        groups={[...new Set(rows.map(({ group }) => group))]}
        themes={themes.map(({ key }) => key)}
        field={field}
        onChange={setFilter}
      >
        {found(chosen.length, tokens.length)}, {settings.counts.pairs} pairs, {themes.length} themes
      </TokenSentence>
      {measured.isLoading && filter.theme !== 'all' ? (
        <Waiting>Measuring every pair in {filter.theme}</Waiting>
      ) : chosen.length === 0 ? (
        <NoTokenFound
          near={isHad(tokens, filter.named) ? undefined : namesNear(tokens, filter.named)}
          href={(name) => paths.token(system, name)}
          onAll={() => setFilter({ ...EVERY_TOKEN, order: filter.order })}
        />
      ) : (
        <FramedLedger system={system} rows={chosen} inOrder={filter.order === 'ledger'} />
      )}
    </>
  )
}

/** Whether some token has the name, so that the rest of the sentence leaves it out. */
function isHad(tokens: readonly LedgerTokenWire[], named: string): boolean {
  const typed = named.trim().toLowerCase()
  return tokens.some(({ name }) => name.toLowerCase().includes(typed))
}

function found(chosen: number, all: number): string {
  return chosen === all ? `${all} tokens` : `${chosen} of ${all} tokens`
}

/** The ledger, with the strip of the frame following it. */
function FramedLedger({
  system,
  rows,
  inOrder,
}: {
  system: string
  rows: readonly LedgerRow[]
  inOrder: boolean
}) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { shown, bands } = useStripBands(system)
  const breaches = useMemo(() => new Map(bands.map(({ name, breach }) => [name, breach])), [bands])
  const { lead, view } = useFrame()
  const onLead = useCallback((name: string, element: Element) => lead({ name, element }), [lead])
  const onView = useCallback<typeof view>(
    (names) => view(inOrder ? names : undefined),
    [view, inOrder],
  )
  useEffect(
    () => () => {
      lead(undefined)
      view(undefined)
    },
    [lead, view],
  )
  const base = themes[0]?.key
  if (shown === undefined || base === undefined) return null
  return (
    <TokenLedger
      rows={rows}
      shown={shown}
      base={base}
      breaches={breaches}
      href={(name) => paths.token(system, name)}
      onLead={onLead}
      onView={onView}
    />
  )
}

function useTokenFilter() {
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readTokenFilter(search), [search])
  const setFilter = (next: TokenFilter) =>
    setSearch(writeTokenFilter(next), { replace: true, preventScrollReset: true })
  return { filter, setFilter }
}

/** The name field, focused when the address says `#find`. */
function useFindField() {
  const field = useRef<HTMLInputElement>(null)
  const { hash, key } = useLocation()
  // biome-ignore lint/correctness/useExhaustiveDependencies: the key makes a second press of the same link focus again
  useEffect(() => {
    if (hash === '#find') field.current?.focus()
  }, [hash, key])
  return field
}
