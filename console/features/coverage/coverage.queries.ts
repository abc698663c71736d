import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { getCoverage } from '#shared/contracts/coverage.contract.ts'

export const coverageQueries = {
  /** What nobody measures, and what pipelines measure that nobody declared. */
  one: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'coverage'],
      queryFn: async () => (await call(getCoverage, { params: { system } })).body,
    }),
}
