import { type ApiRouter, mount } from '#api/http/route.ts'
import { addressOf } from '#shared/contracts/route.ts'
import {
  createPair,
  deletePair,
  getPair,
  listPairs,
  patchPair,
} from '#shared/contracts/pairs.contract.ts'
import type { PairsService } from './pairs.service.ts'

export function mountPairs(router: ApiRouter, pairs: PairsService): void {
  mount(router, listPairs, ({ system, query }) => pairs.list(system, query))
  mount(router, createPair, async ({ system, params, body }) => {
    const made = await pairs.create(system, body)
    return { body: made, location: addressOf(getPair, { ...params, id: made.id }) }
  })
  mount(router, getPair, async ({ system, params }) => ({
    body: await pairs.get(system, params.id),
  }))
  mount(router, patchPair, async ({ system, params, ifMatch, body }) => ({
    body: await pairs.patch(system, { id: params.id, ifMatch }, body),
  }))
  mount(router, deletePair, async ({ system, params, ifMatch, query }) => {
    await pairs.remove(system, { id: params.id, ifMatch }, query.message)
    return undefined
  })
}
