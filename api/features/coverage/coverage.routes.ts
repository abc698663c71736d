import { type ApiRouter, mount } from '#api/http/route.ts'
import { getCoverage } from '#shared/contracts/coverage.contract.ts'
import type { CoverageService } from './coverage.service.ts'

export function mountCoverage(router: ApiRouter, coverage: CoverageService): void {
  mount(router, getCoverage, async ({ system }) => ({ body: await coverage.get(system) }))
}
