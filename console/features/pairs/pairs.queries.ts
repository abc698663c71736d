import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { everyItem } from '#console/lib/every-item.ts'
import { listPairs } from '#shared/contracts/pairs.contract.ts'

export const pairQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'pairs'],
      queryFn: () =>
        everyItem((cursor) =>
          call(listPairs, { params: { system }, query: { limit: 500, cursor } }),
        ),
    }),
}
