import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import {
  getRules,
  putRules,
  type RuleScopeWire,
  type RulesWire,
} from '#shared/contracts/rules.contract.ts'
import { patchToken } from '#shared/contracts/tokens.contract.ts'
import type { Scope } from './rule-scopes.ts'

export const ruleQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'rules'],
      queryFn: async () => (await call(getRules, { params: { system } })).body,
    }),
}

export interface RulesWrite {
  readonly system: string
  readonly scope: Scope
  readonly rules: RuleScopeWire
  /** All rules as they stand; those of other scopes stay. */
  readonly standing: RulesWire
  /** Of the rules, or of the token that they narrow. */
  readonly etag: string
  readonly message: string
}

/** Writes the rules of one scope to the head; answers what that did. */
export async function saveRules({ system, scope, rules, standing, etag, message }: RulesWrite) {
  const said = message.trim() === '' ? {} : { message }
  if (scope.kind === 'token') {
    const params = { system, name: scope.name }
    return (
      await call(patchToken, {
        params,
        ifMatch: etag,
        body: { rules: isNone(rules) ? null : rules, ...said },
      })
    ).body
  }
  const { states, prefixes } = standing
  const body =
    scope.kind === 'system'
      ? { states: rules.states ?? {}, prefixes }
      : { states, prefixes: withPrefix(prefixes, scope.prefix, rules) }
  return (await call(putRules, { params: { system }, ifMatch: etag, body: { ...body, ...said } }))
    .body
}

function withPrefix(prefixes: RulesWire['prefixes'], prefix: string, rules: RuleScopeWire) {
  const others = prefixes.filter((each) => each.prefix !== prefix)
  return isNone(rules) ? others : [...others, { prefix, ...rules }]
}

function isNone({ states, themes }: RuleScopeWire): boolean {
  return states === undefined && themes === undefined
}
