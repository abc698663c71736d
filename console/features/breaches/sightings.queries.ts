import { infiniteQueryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { listSightings } from '#shared/contracts/sightings.contract.ts'
import { queryOfSightings, type SightingFilter } from './sighting-filter.ts'

export const sightingQueries = {
  list: (system: string, filter: SightingFilter) =>
    infiniteQueryOptions({
      queryKey: ['system', system, 'sightings', filter],
      queryFn: ({ pageParam }) =>
        call(listSightings, {
          params: { system },
          query: { ...queryOfSightings(filter), cursor: pageParam },
        }),
      initialPageParam: undefined as string | undefined,
      getNextPageParam: (page) => page.next,
    }),
}
