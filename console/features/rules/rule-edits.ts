import type { SystemEdits } from '#shared/checks/edits.ts'
import type { DerivedState, SystemModel } from '#shared/checks/model.ts'
import { createRuleScopes } from '#shared/checks/rule-scopes.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import type { RuleScopeWire, StateRuleWire } from '#shared/contracts/rules.contract.ts'
import { type Reading, readRuleScope } from '#shared/contracts/wire-values.ts'
import type { Scope } from './rule-scopes.ts'

/** What a scope's rules come to for the engine, or what they name that is not there. */
export type ReadRules =
  | { readonly ok: true; readonly edits: SystemEdits }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** The head with other rules for one scope. */
export function ruleEdits(model: SystemModel, scope: Scope, rules: RuleScopeWire): ReadRules {
  const tokens = new Map(model.tokens.map(({ name, id }) => [name, id]))
  const themes = new Map(model.themes.map(({ key, id }) => [key, id]))
  const faults: Fault[] = []
  const reading: Reading = {
    names: { tokenId: (name) => tokens.get(name), themeId: (key) => themes.get(key) },
    faults,
  }
  const read = readRuleScope(rules, '', reading)
  if (faults.length > 0) return { ok: false, faults }
  return { ok: true, edits: editsOf(model, scope, read) }
}

function editsOf(
  model: SystemModel,
  scope: Scope,
  read: ReturnType<typeof readRuleScope>,
): SystemEdits {
  if (scope.kind === 'system') return { states: read.states ?? {} }
  if (scope.kind === 'token') {
    const put = model.tokens.filter(({ name }) => name === scope.name)
    return { tokens: { put: put.map(({ rules: _, ...token }) => ({ ...token, rules: read })) } }
  }
  const others = model.prefixes.filter(({ prefix }) => prefix !== scope.prefix)
  const isEmpty = read.states === undefined && read.themes === undefined
  return { prefixes: isEmpty ? others : [...others, { prefix: scope.prefix, ...read }] }
}

/** What would hold of a state in this scope if it said nothing. */
export function widerStateRule(
  model: SystemModel,
  scope: Scope,
  state: DerivedState,
): StateRuleWire {
  const name = scope.kind === 'system' ? '' : scope.kind === 'prefix' ? scope.prefix : scope.name
  const wider: SystemModel = {
    ...model,
    states: scope.kind === 'system' ? {} : model.states,
    prefixes: model.prefixes.filter(
      ({ prefix }) => !(scope.kind === 'prefix' && prefix === scope.prefix),
    ),
  }
  const token = { id: '', name, value: BLACK, states: [], values: {} }
  const { towards, ...adjustment } = createRuleScopes(wider).stateRuleOf(token, state)
  const reference =
    typeof towards.reference === 'string'
      ? towards.reference
      : `{${tokenName(model, towards.reference.token)}}`
  return { ...adjustment, [towards.direction]: reference }
}

const BLACK = { kind: 'color', color: { l: 0, c: 0, h: null, alpha: 1 } } as const

function tokenName(model: SystemModel, id: string): string {
  return model.tokens.find((token) => token.id === id)?.name ?? id
}
