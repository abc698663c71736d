import { type ApiRouter, mount } from '#api/http/route.ts'
import { addressOf } from '#shared/contracts/route.ts'
import {
  createToken,
  deleteToken,
  getToken,
  listTokens,
  patchToken,
} from '#shared/contracts/tokens.contract.ts'
import type { TokensService } from './tokens.service.ts'

export function mountTokens(router: ApiRouter, tokens: TokensService): void {
  mount(router, listTokens, ({ system, query }) => tokens.list(system, query))
  mount(router, createToken, async ({ system, params, body }) => ({
    body: await tokens.create(system, body),
    location: addressOf(getToken, { ...params, name: body.name }),
  }))
  mount(router, getToken, async ({ system, params }) => ({
    body: await tokens.get(system, params.name),
  }))
  mount(router, patchToken, async ({ system, params, ifMatch, body }) => ({
    body: await tokens.patch(system, { name: params.name, ifMatch }, body),
  }))
  mount(router, deleteToken, async ({ system, params, ifMatch, query }) => {
    await tokens.remove(system, { name: params.name, ifMatch }, query.message)
    return undefined
  })
}
