import { type ApiRouter, mount } from '#api/http/route.ts'
import { listMembers, putMembers } from '#shared/contracts/members.contract.ts'
import type { MembersService } from './members.service.ts'

export function mountMembers(router: ApiRouter, members: MembersService): void {
  mount(router, listMembers, async ({ system }) => ({ body: await members.list(system) }))
  mount(router, putMembers, async ({ system, body, ifMatch }) => ({
    body: await members.replace(system, body.items, ifMatch),
  }))
}
