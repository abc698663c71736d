import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { listMembers } from '#shared/contracts/members.contract.ts'

export const memberQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'members'],
      queryFn: async () => (await call(listMembers, { params: { system } })).body.items,
    }),
}
