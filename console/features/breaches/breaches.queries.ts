import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { getBreach, listBreaches } from '#shared/contracts/breaches.contract.ts'
import { type BreachFilter, queryOfFilter } from './breach-filter.ts'

export const breachQueries = {
  list: (system: string, filter: BreachFilter) =>
    infiniteQueryOptions({
      queryKey: ['system', system, 'breaches', filter],
      queryFn: ({ pageParam }) =>
        call(listBreaches, {
          params: { system },
          query: { ...queryOfFilter(filter), cursor: pageParam },
        }),
      initialPageParam: undefined as string | undefined,
      getNextPageParam: (page) => page.next,
    }),
  one: (system: string, id: string) =>
    queryOptions({
      queryKey: ['system', system, 'breach', id],
      queryFn: async () => (await call(getBreach, { params: { system, id } })).body,
    }),
}
