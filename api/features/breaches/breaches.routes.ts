import { type ApiRouter, mount } from '#api/http/route.ts'
import { getBreach, listBreaches } from '#shared/contracts/breaches.contract.ts'
import type { BreachesService } from './breaches.service.ts'

export function mountBreaches(router: ApiRouter, breaches: BreachesService): void {
  mount(router, listBreaches, ({ system, query }) => breaches.list(system, query))
  mount(router, getBreach, async ({ system, params }) => ({
    body: await breaches.get(system, params.id),
  }))
}
