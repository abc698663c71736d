import { type ApiRouter, mount } from '#api/http/route.ts'
import { createCheck, getCheck, listChecks } from '#shared/contracts/checks.contract.ts'
import type { ChecksService } from './checks.service.ts'

export function mountChecks(router: ApiRouter, checks: ChecksService): void {
  mount(router, createCheck, async ({ system, body, query }) => ({
    body: await checks.create(system, { body, query }),
  }))
  mount(router, listChecks, ({ system, query }) => checks.list(system, query))
  mount(router, getCheck, async ({ system, params }) => ({
    body: await checks.get(system, params.id),
  }))
}
