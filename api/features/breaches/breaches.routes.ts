import { type ApiRouter, mount } from '#api/http/route.ts'
import {
  createBreachComment,
  exportBreaches,
  getBreach,
  listBreaches,
  patchBreach,
} from '#shared/contracts/breaches.contract.ts'
import { addressOf } from '#shared/contracts/route.ts'
import type { BreachHandlingService } from './breach-handling.service.ts'
import { listSightings } from '#shared/contracts/sightings.contract.ts'
import type { BreachesService } from './breaches.service.ts'
import type { SightingsService } from './sightings.service.ts'

interface BreachLog {
  readonly breaches: BreachesService
  readonly breachHandling: BreachHandlingService
  readonly sightings: SightingsService
}

export function mountBreaches(router: ApiRouter, log: BreachLog): void {
  const { breaches, breachHandling, sightings } = log
  mount(router, listBreaches, ({ system, query }) => breaches.list(system, query))
  mount(router, exportBreaches, async ({ system, query }) => ({
    text: await breaches.table(system, query),
    media: exportBreaches.success.media[0],
    headers: { 'Content-Disposition': `attachment; filename="${system.key}-breaches.csv"` },
  }))
  mount(router, getBreach, async ({ system, params }) => ({
    body: await breaches.get(system, params.id),
  }))
  mount(router, patchBreach, async ({ system, params, body, ifMatch }) => ({
    body: await breachHandling.assign(system, params.id, { ...body, ifMatch }),
  }))
  mount(router, createBreachComment, async ({ system, params, body }) => ({
    body: await breachHandling.comment(system, params.id, body.body),
    location: addressOf(getBreach, params),
  }))
  mount(router, listSightings, ({ system, query }) => sightings.list(system, query))
}
