import { type ApiRouter, mount } from '#api/http/route.ts'
import { addressOf } from '#shared/contracts/route.ts'
import {
  createSystem,
  getSystem,
  listSystems,
  patchSystem,
} from '#shared/contracts/systems.contract.ts'
import type { SystemsService } from './systems.service.ts'

export function mountSystems(router: ApiRouter, systems: SystemsService): void {
  mount(router, listSystems, async ({ caller }) => ({
    body: { items: await systems.list(caller) },
  }))
  mount(router, createSystem, async ({ caller, body }) => ({
    body: await systems.create(caller, body),
    location: addressOf(getSystem, { system: body.key }),
  }))
  mount(router, getSystem, async ({ system }) => ({ body: await systems.get(system) }))
  mount(router, patchSystem, async ({ system, ifMatch, body }) => ({
    body: await systems.patch(system, ifMatch, body),
  }))
}
