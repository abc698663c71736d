import type { Reference, RuleScope, SourceValue, StateRules } from '#shared/checks/model.ts'
import type { GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'

/** Something that would be left without a token that it names. */
export interface TokenUse {
  readonly as:
    | 'pair'
    | 'alias'
    | 'derivation'
    | 'rule'
    | 'ground'
    | 'ink'
    | 'replacement'
    | 'distinct-set'
  /** The names of what uses it. */
  readonly by: string
}

/** Everything in a system that names a token. */
export function usesOf(model: GovernedSystem, id: string): readonly TokenUse[] {
  return [
    ...pairUses(model, id),
    ...model.tokens.flatMap((token) => (token.id === id ? [] : tokenUses(token, id))),
    ...ruleUses(model, id),
    ...model.themes.flatMap((theme): TokenUse[] => [
      ...(theme.ground === id ? [{ as: 'ground' as const, by: `theme ${theme.key}` }] : []),
      ...(theme.ink === id ? [{ as: 'ink' as const, by: `theme ${theme.key}` }] : []),
    ]),
    ...(model.distinctSets ?? []).flatMap((set): TokenUse[] =>
      set.tokens.includes(id) ? [{ as: 'distinct-set', by: set.name }] : [],
    ),
  ]
}

const MOST_NAMED = 5

/** The uses in one line, such as `by pairs: a on b, a on c; by aliases: d; as ink of theme e`. */
export function describeUses(uses: readonly TokenUse[]): string {
  const parts = Object.entries(LABELS).flatMap(([as, label]) => {
    const names = [...new Set(uses.flatMap((use) => (use.as === as ? [use.by] : [])))]
    if (names.length === 0) return []
    const shown = names.slice(0, MOST_NAMED).join(', ')
    const rest = names.length > MOST_NAMED ? ` and ${names.length - MOST_NAMED} more` : ''
    return [`${label} ${shown}${rest}`]
  })
  return parts.join('; ')
}

const LABELS: Record<TokenUse['as'], string> = {
  pair: 'by pairs:',
  alias: 'by aliases:',
  derivation: 'by derived tokens:',
  rule: 'by rules of',
  ground: 'as ground of',
  ink: 'as ink of',
  replacement: 'as replacement of',
  'distinct-set': 'in distinct sets:',
}

function pairUses(model: GovernedSystem, id: string): TokenUse[] {
  const nameOf = (token: string) => model.tokens.find((one) => one.id === token)?.name ?? token
  return model.pairs
    .filter(
      ({ foreground, background, backdrop }) =>
        foreground === id || background === id || (backdrop !== 'unknown' && backdrop.includes(id)),
    )
    .map((pair) => ({
      as: 'pair',
      by: `${nameOf(pair.foreground)} on ${nameOf(pair.background)}`,
    }))
}

function tokenUses(token: GovernedToken, id: string): TokenUse[] {
  const values: (SourceValue | undefined)[] = [
    token.value,
    ...Object.values(token.values).flatMap((byState) => Object.values(byState)),
  ]
  const uses = values.flatMap((value): TokenUse[] => {
    if (value === undefined || value.kind === 'color' || value.token !== id) return []
    return [{ as: value.kind === 'alias' ? 'alias' : 'derivation', by: token.name }]
  })
  if (token.rules && scopeNames(token.rules, id)) uses.push({ as: 'rule', by: token.name })
  if (token.deprecated?.replacement === id) uses.push({ as: 'replacement', by: token.name })
  return uses
}

function ruleUses(model: GovernedSystem, id: string): TokenUse[] {
  return [
    ...(statesName(model.states, id) ? [{ as: 'rule' as const, by: 'the system' }] : []),
    ...model.prefixes
      .filter((scope) => scopeNames(scope, id))
      .map(({ prefix }) => ({ as: 'rule' as const, by: `prefix ${prefix}` })),
    ...model.themes
      .filter(({ rule }) => isNamed(rule.against, id))
      .map(({ key }) => ({ as: 'rule' as const, by: `theme ${key}` })),
  ]
}

const isNamed = (reference: Reference | undefined, id: string) =>
  typeof reference === 'object' && reference.token === id

const statesName = (states: StateRules | undefined, id: string) =>
  Object.values(states ?? {}).some((rule) => isNamed(rule?.towards?.reference, id))

const scopeNames = ({ states, themes }: RuleScope, id: string) =>
  statesName(states, id) || Object.values(themes ?? {}).some(({ against }) => isNamed(against, id))
