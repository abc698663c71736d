import { type ApiRouter, mount } from '#api/http/route.ts'
import { addressOf } from '#shared/contracts/route.ts'
import { createKey, deleteKey, listKeys } from '#shared/contracts/keys.contract.ts'
import type { KeysService } from './keys.service.ts'

export function mountKeys(router: ApiRouter, keys: KeysService): void {
  mount(router, listKeys, async ({ system }) => ({ body: await keys.list(system) }))
  mount(router, createKey, async ({ system, params, body }) => {
    const made = await keys.create(system, body)
    return { body: made, location: addressOf(deleteKey, { ...params, id: made.id }) }
  })
  mount(router, deleteKey, async ({ system, params }) => {
    await keys.revoke(system, params.id)
    return undefined
  })
}
