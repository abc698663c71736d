import type { PairModel, SystemModel, TokenModel } from './model.ts'

/** The tokens that a token's values follow: aliases and derivations, in any theme and state. */
function followed({ value, values }: TokenModel): string[] {
  const set = [value, ...Object.values(values).flatMap((byState) => Object.values(byState))]
  return set.flatMap((one) => (one === undefined || one.kind === 'color' ? [] : [one.token]))
}

/** Every token that a pair names: its sides, and what lies under them. */
function namedBy({ foreground, background, backdrop }: PairModel): string[] {
  return [foreground, background, ...(backdrop === 'unknown' ? [] : backdrop)]
}

/**
 * The tokens in no pair: neither named by one, nor followed by a token that is.
 * @returns in ledger order
 */
export function uncoveredTokens<Token extends TokenModel>(
  model: Pick<SystemModel, 'pairs'> & { readonly tokens: readonly Token[] },
): Token[] {
  const tokens = new Map(model.tokens.map((token) => [token.id, token]))
  const covered = new Set(model.pairs.flatMap(namedBy))
  // A set is walked in order of insertion, so what is added is walked as well.
  for (const id of covered) {
    const token = tokens.get(id)
    for (const target of token ? followed(token) : []) covered.add(target)
  }
  return model.tokens.filter(({ id }) => !covered.has(id))
}

/** What a pair measures, as text: two pairs that measure the same differ in what they ask, or for whom. */
export function measuredBy(
  pair: Pick<PairModel, 'foreground' | 'background' | 'use' | 'relation'> & {
    readonly backdrop?: PairModel['backdrop'] | undefined
  },
): string {
  const { foreground, background, backdrop = [], use, relation } = pair
  return JSON.stringify([foreground, background, backdrop, use, relation])
}
