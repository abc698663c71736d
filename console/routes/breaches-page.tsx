import { useSuspenseInfiniteQuery, useSuspenseQuery } from '@tanstack/react-query'
import { Suspense, useCallback, useEffect, useMemo, useRef } from 'react'
import { type LoaderFunctionArgs, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import {
  type BreachFilter,
  readBreachFilter,
  writeBreachFilter,
} from '#console/features/breaches/breach-filter.ts'
import { BreachSentence } from '#console/features/breaches/breach-sentence.tsx'
import { BreachTable } from '#console/features/breaches/breach-table.tsx'
import { breachQueries } from '#console/features/breaches/breaches.queries.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere, Waiting } from '#console/ui/page-states.tsx'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { BreachPlaces } from './breach-places.tsx'
import { OpenedBreach } from './opened-breach.tsx'
import { useFrame } from './system-frame.tsx'

export async function loader({ params, request }: LoaderFunctionArgs) {
  const { system = '', id } = params
  const filter = readBreachFilter(new URL(request.url).searchParams)
  await Promise.all([
    queryClient.ensureInfiniteQueryData(breachQueries.list(system, filter)),
    queryClient.ensureQueryData(memberQueries.list(system)),
    id === undefined ? undefined : queryClient.ensureQueryData(breachQueries.one(system, id)),
  ])
  return null
}

export function Component() {
  const { system = '', id } = useParams()
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readBreachFilter(search), [search])
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: members } = useSuspenseQuery(memberQueries.all(system))
  const log = useSuspenseInfiniteQuery(breachQueries.list(system, filter))
  const breaches = log.data.pages.flatMap((page) => page.body.items)
  const { total = 0, ever = 0 } = log.data.pages[0]?.body ?? {}
  const setFilter = useCallback(
    (next: BreachFilter) => setSearch(writeBreachFilter(next), { preventScrollReset: true }),
    [setSearch],
  )
  return (
    <>
      <title>{`Breaches of ${system} · Dyewright`}</title>
      <BreachPlaces system={system} />
      <BreachSentence
        filter={filter}
        themes={themes.map(({ key }) => key)}
        people={members}
        onChange={setFilter}
      >
        {total} of {ever} ever entered
      </BreachSentence>
      {breaches.length === 0 && id === undefined ? (
        <NoBreach ever={ever} />
      ) : (
        <FramedLog system={system} opened={id} breaches={breaches} search={search.toString()} />
      )}
      {log.hasNextPage && (
        <p className="py-16">
          <WordButton disabled={log.isFetchingNextPage} onClick={() => void log.fetchNextPage()}>
            {log.isFetchingNextPage ? 'Fetching more' : 'Show more'}
          </WordButton>
        </p>
      )}
    </>
  )
}

function NoBreach({ ever }: { ever: number }) {
  return ever === 0 ? (
    <NothingHere title="No breach was ever entered.">
      Every declared pair has met its line in every theme and state.
    </NothingHere>
  ) : (
    <NothingHere title="No breach answers to this sentence.">
      The log keeps all it ever took; ask for another status to see them.
    </NothingHere>
  )
}

function FramedLog({
  system,
  opened,
  breaches,
  search,
}: {
  system: string
  opened: string | undefined
  breaches: readonly BreachWire[]
  search: string
}) {
  const place = useRef<HTMLDivElement>(null)
  const query = search === '' ? '' : `?${search}`
  const rows = useWithOpened(system, opened, breaches)
  const foreground = rows.find(({ id }) => id === opened)?.foreground
  const { lead } = useFrame()
  useEffect(() => {
    const row = place.current?.querySelector('[data-opened]')
    lead(row && foreground !== undefined ? { name: foreground, element: row } : undefined)
    return () => lead(undefined)
  }, [lead, foreground])
  return (
    <div ref={place}>
      <BreachTable
        breaches={rows}
        opened={opened}
        href={(breach) =>
          breach.id === opened
            ? paths.breaches(system, query)
            : paths.breach(system, breach.id, query)
        }
        under={
          opened !== undefined && (
            <Suspense fallback={<Waiting>Reading its history</Waiting>}>
              <OpenedBreach key={opened} system={system} id={opened} />
            </Suspense>
          )
        }
      />
    </div>
  )
}

/** The rows, led by the opened breach where the sentence leaves it out. */
function useWithOpened(
  system: string,
  opened: string | undefined,
  breaches: readonly BreachWire[],
): readonly BreachWire[] {
  const isListed = opened === undefined || breaches.some(({ id }) => id === opened)
  const held = isListed
    ? undefined
    : queryClient.getQueryData(breachQueries.one(system, opened).queryKey)
  return held === undefined ? breaches : [held, ...breaches]
}
