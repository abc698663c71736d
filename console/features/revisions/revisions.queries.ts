import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { listRevisions } from '#shared/contracts/revisions.contract.ts'

export const revisionQueries = {
  /** The newest revision's summary. */
  head: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'head revision'],
      queryFn: async () =>
        (await call(listRevisions, { params: { system }, query: { limit: 1 } })).body.items[0] ??
        null,
    }),
}
