import { coversName } from '#shared/checks/rule-scopes.ts'
import type { RulesWire } from '#shared/contracts/rules.contract.ts'
import type { RuleScopeWire } from '#shared/contracts/rules.contract.ts'
import type { LedgerTokenWire } from '#shared/contracts/tokens.contract.ts'

/** What a set of rules is for: the whole system, the names under a prefix, or one token. */
export type Scope =
  | { readonly kind: 'system' }
  | { readonly kind: 'prefix'; readonly prefix: string }
  | { readonly kind: 'token'; readonly name: string }

/** A scope with its rules and the tokens that come under it. */
export interface ScopedRules {
  readonly scope: Scope
  readonly rules: RuleScopeWire
  readonly governs: readonly string[]
}

/** A scope as it stands in an address. */
export function scopeText(scope: Scope): string {
  if (scope.kind === 'system') return 'system'
  return scope.kind === 'prefix' ? `prefix:${scope.prefix}` : `token:${scope.name}`
}

export function readScope(text: string | null): Scope | undefined {
  if (text === 'system') return { kind: 'system' }
  const [, kind, name = ''] = /^(prefix|token):(.+)$/su.exec(text ?? '') ?? []
  if (kind === 'prefix') return { kind, prefix: name }
  return kind === 'token' ? { kind, name } : undefined
}

type RuledToken = Pick<LedgerTokenWire, 'name' | 'rules'>

/** Every scope that has rules, from wide to narrow; the system always. */
export function scopedRules(rules: RulesWire, tokens: readonly RuledToken[]): ScopedRules[] {
  const prefixes = [...rules.prefixes].sort((a, b) => (a.prefix < b.prefix ? -1 : 1))
  const narrowed = tokens.filter((token) => saysAnything(token.rules))
  return [
    { kind: 'system' } as const,
    ...prefixes.map(({ prefix }) => ({ kind: 'prefix', prefix }) as const),
    ...narrowed.map(({ name }) => ({ kind: 'token', name }) as const),
  ].map((scope) => rulesOf(scope, rules, tokens))
}

/** The rules of one scope, empty where it has none yet. */
export function rulesOf(
  scope: Scope,
  rules: RulesWire,
  tokens: readonly RuledToken[],
): ScopedRules {
  const governs = tokens.map(({ name }) => name).filter((name) => isIn(scope, name))
  return { scope, rules: ownRules(scope, rules, tokens), governs }
}

function ownRules(scope: Scope, rules: RulesWire, tokens: readonly RuledToken[]): RuleScopeWire {
  if (scope.kind === 'system') return { states: rules.states }
  if (scope.kind === 'token') return tokens.find(({ name }) => name === scope.name)?.rules ?? {}
  const { prefix: _, ...own } = rules.prefixes.find(({ prefix }) => prefix === scope.prefix) ?? {
    prefix: scope.prefix,
  }
  return own
}

function isIn(scope: Scope, name: string): boolean {
  if (scope.kind === 'system') return true
  return scope.kind === 'token' ? name === scope.name : coversName(scope.prefix, name)
}

/** Whether a scope lies within another one, so that its rules go before. */
export function isNarrower(scope: Scope, than: Scope): boolean {
  if (scope.kind === 'system' || than.kind === 'token') return false
  const name = scope.kind === 'prefix' ? scope.prefix : scope.name
  if (than.kind === 'system') return true
  return coversName(than.prefix, name) && !(scope.kind === 'prefix' && name === than.prefix)
}

/** Whether any field of any rule is said. */
export function saysAnything(rules: RuleScopeWire | undefined): boolean {
  const all = [...Object.values(rules?.states ?? {}), ...Object.values(rules?.themes ?? {})]
  return all.some((rule) => rule !== undefined && Object.keys(rule).length > 0)
}

export function scopeInWords(scope: Scope): string {
  if (scope.kind === 'system') return 'the whole system'
  return scope.kind === 'prefix' ? scope.prefix : scope.name
}
