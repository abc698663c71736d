import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { getSystem, listSystems } from '#shared/contracts/systems.contract.ts'

export const systemQueries = {
  all: () =>
    queryOptions({
      queryKey: ['systems'],
      queryFn: async () => (await call(listSystems, {})).body.items,
    }),
  one: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'settings'],
      queryFn: async () => (await call(getSystem, { params: { system } })).body,
    }),
}
