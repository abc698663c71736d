import { type ApiRouter, mount } from '#api/http/route.ts'
import { getRules, putRules } from '#shared/contracts/rules.contract.ts'
import type { RulesService } from './rules.service.ts'

export function mountRules(router: ApiRouter, rules: RulesService): void {
  mount(router, getRules, async ({ system }) => ({ body: await rules.get(system) }))
  mount(router, putRules, async ({ system, ifMatch, body }) => ({
    body: await rules.replace(system, ifMatch, body),
  }))
}
