import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { getRules } from '#shared/contracts/rules.contract.ts'

export const ruleQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'rules'],
      queryFn: async () => (await call(getRules, { params: { system } })).body,
    }),
}
