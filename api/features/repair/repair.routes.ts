import { type ApiRouter, mount } from '#api/http/route.ts'
import { nearestPassing, planRepair } from '#shared/contracts/repair.contract.ts'
import type { RepairService } from './repair.service.ts'

export function mountRepair(router: ApiRouter, repair: RepairService): void {
  mount(router, nearestPassing, async ({ system, params, body }) => ({
    body: await repair.nearest(system, params.name, body.budget),
  }))
  mount(router, planRepair, async ({ system, body }) => ({
    body: await repair.plan(system, body.budget),
  }))
}
