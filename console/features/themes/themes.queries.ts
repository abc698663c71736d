import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { listThemes } from '#shared/contracts/themes.contract.ts'

export const themeQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'themes'],
      queryFn: async () => (await call(listThemes, { params: { system } })).body.items,
    }),
}
