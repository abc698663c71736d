import type { SystemAccess } from '#api/caller.ts'
import { type ApiRouter, mount } from '#api/http/route.ts'
import {
  type CheckWire,
  createCheck,
  getCheck,
  listChecks,
} from '#shared/contracts/checks.contract.ts'
import type { MediaOf } from '#shared/contracts/route.ts'
import { sarifOf } from '#shared/formats/sarif.ts'
import type { ChecksService } from './checks.service.ts'

export function mountChecks(router: ApiRouter, checks: ChecksService): void {
  mount(router, createCheck, async ({ system, body, query, media }) =>
    answerIn(media, await checks.create(system, { body, query }), system),
  )
  mount(router, listChecks, ({ system, query }) => checks.list(system, query))
  mount(router, getCheck, async ({ system, params, media }) =>
    answerIn(media, await checks.get(system, params.id), system),
  )
}

function answerIn(media: MediaOf<typeof getCheck>, check: CheckWire, { key }: SystemAccess) {
  return media === 'application/sarif+json' ? { media, body: sarifOf(check, key) } : { body: check }
}
