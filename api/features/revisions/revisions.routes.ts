import { type ApiRouter, mount } from '#api/http/route.ts'
import { getRevision, listRevisions } from '#shared/contracts/revisions.contract.ts'
import type { RevisionsService } from './revisions.service.ts'

export function mountRevisions(router: ApiRouter, revisions: RevisionsService): void {
  mount(router, listRevisions, ({ system, query }) => revisions.list(system, query))
  mount(router, getRevision, async ({ system, params }) => ({
    body: await revisions.get(system, params.number),
  }))
}
