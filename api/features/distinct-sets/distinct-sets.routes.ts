import { type ApiRouter, mount } from '#api/http/route.ts'
import {
  createDistinctSet,
  deleteDistinctSet,
  getDistinctSet,
  listDistinctSets,
  patchDistinctSet,
} from '#shared/contracts/distinct-sets.contract.ts'
import { addressOf } from '#shared/contracts/route.ts'
import type { DistinctSetsService } from './distinct-sets.service.ts'

export function mountDistinctSets(router: ApiRouter, sets: DistinctSetsService): void {
  mount(router, listDistinctSets, async ({ system }) => ({
    body: { items: await sets.list(system) },
  }))
  mount(router, createDistinctSet, async ({ system, params, body }) => {
    const made = await sets.create(system, body)
    return { body: made, location: addressOf(getDistinctSet, { ...params, id: made.id }) }
  })
  mount(router, getDistinctSet, async ({ system, params }) => ({
    body: await sets.get(system, params.id),
  }))
  mount(router, patchDistinctSet, async ({ system, params, ifMatch, body }) => ({
    body: await sets.patch(system, { id: params.id, ifMatch }, body),
  }))
  mount(router, deleteDistinctSet, async ({ system, params, ifMatch, query }) => {
    await sets.remove(system, { id: params.id, ifMatch }, query.message)
    return undefined
  })
}
