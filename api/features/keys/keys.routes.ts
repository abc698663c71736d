import { type ApiRouter, mount } from '#api/http/route.ts'
import { createKey, deleteKey, listKeys } from '#shared/contracts/keys.contract.ts'
import type { KeysService } from './keys.service.ts'

export function mountKeys(router: ApiRouter, keys: KeysService): void {
  mount(router, listKeys, async ({ system }) => ({ body: await keys.list(system) }))
  mount(router, createKey, async ({ system, body }) => ({ body: await keys.create(system, body) }))
  mount(router, deleteKey, async ({ system, params }) => {
    await keys.revoke(system, params.id)
    return undefined
  })
}
