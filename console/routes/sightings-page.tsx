import { useSuspenseInfiniteQuery, useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { type LoaderFunctionArgs, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import {
  BRANCH_CHOICES,
  readSightingFilter,
  SIGHTING_ORDERS,
  type SightingFilter,
  writeSightingFilter,
} from '#console/features/breaches/sighting-filter.ts'
import { sightingQueries } from '#console/features/breaches/sightings.queries.ts'
import { SightingsTable } from '#console/features/breaches/sightings-table.tsx'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { WordButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { NothingHere } from '#console/ui/page-states.tsx'
import { countOf } from '#shared/checks/finding-words.ts'
import { BreachPlaces } from './breach-places.tsx'

export async function loader({ params: { system = '' }, request }: LoaderFunctionArgs) {
  const filter = readSightingFilter(new URL(request.url).searchParams)
  await queryClient.ensureInfiniteQueryData(sightingQueries.list(system, filter))
  return null
}

/** What pipelines found short, by repository and branch. */
export function Component() {
  const { system = '' } = useParams()
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readSightingFilter(search), [search])
  const list = useSuspenseInfiniteQuery(sightingQueries.list(system, filter))
  const sightings = list.data.pages.flatMap((page) => page.body.items)
  const total = list.data.pages[0]?.body.total ?? 0
  return (
    <>
      <title>{`Seen in CI for ${system} · Dyewright`}</title>
      <BreachPlaces system={system} />
      <SightingSentence
        system={system}
        filter={filter}
        total={total}
        onChange={(next) => setSearch(writeSightingFilter(next), { preventScrollReset: true })}
      />
      {sightings.length === 0 ? (
        <NothingHere title="No pipeline has found anything short here.">
          A check that names its repository and branch is noted; what a protected branch finds short
          opens a breach, the rest is kept for 30 days.
        </NothingHere>
      ) : (
        <SightingsTable sightings={sightings} breachHref={(id) => paths.breach(system, id)} />
      )}
      {list.hasNextPage && (
        <p className="py-16">
          <WordButton disabled={list.isFetchingNextPage} onClick={() => void list.fetchNextPage()}>
            {list.isFetchingNextPage ? 'Fetching more' : 'Show more'}
          </WordButton>
        </p>
      )}
    </>
  )
}

function SightingSentence({
  system,
  filter,
  total,
  onChange,
}: {
  system: string
  filter: SightingFilter
  total: number
  onChange: (filter: SightingFilter) => void
}) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const themeChoices = [
    { value: 'all', text: 'all themes' },
    ...themes.map(({ key }) => ({ value: key, text: key })),
  ]
  return (
    <search className="flex min-h-48 flex-wrap items-center gap-x-8 gap-y-6 py-8">
      Found short on
      <Choice
        label="Branches"
        value={filter.branches}
        options={BRANCH_CHOICES}
        onChange={(branches) => onChange({ ...filter, branches })}
      />
      in
      <Choice
        label="Theme"
        value={filter.theme}
        options={themeChoices}
        onChange={(theme) => onChange({ ...filter, theme })}
      />
      <Choice
        label="Order"
        value={filter.order}
        options={SIGHTING_ORDERS}
        onChange={(order) => onChange({ ...filter, order })}
      />
      <p role="status" className="w-full text-ink-soft full:ml-auto full:w-auto">
        {startSentence(countOf(total, 'sighting'))}
      </p>
    </search>
  )
}
