import type { ModelFault, TokenModel } from '#shared/checks/model.ts'
import { ALIAS_LIMIT } from '#shared/checks/value-pass.ts'

/** The tokens whose sources follow too many aliases; in a circle there is no end of them. */
export function aliasesTooDeep(tokens: readonly TokenModel[]): ModelFault[] {
  const byId = new Map(tokens.map((token) => [token.id, token]))
  const isTooDeep = (token: TokenModel) => {
    let at: TokenModel | undefined = token
    let count = 0
    while (at?.value.kind === 'alias' && count <= ALIAS_LIMIT) {
      count += 1
      at = byId.get(at.value.token)
    }
    return count > ALIAS_LIMIT
  }
  return tokens.filter(isTooDeep).map(({ id, name }) => ({
    code: 'alias-depth',
    detail: `${name} follows more than ${ALIAS_LIMIT} aliases, one after another`,
    token: id,
  }))
}
