import { measuredBy } from '#shared/checks/coverage.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'

/** The pairs that no declared one measures, each once, as it was given last. */
export function undeclaredPairs(
  { model, names }: SystemIndex,
  pairs: readonly PairInput[],
): PairInput[] {
  if (pairs.length === 0) return []
  const declared = new Set(model.pairs.map(measuredBy))
  const asDeclared = ({ foreground, background, backdrop = [], ...pair }: PairInput) =>
    measuredBy({
      ...pair,
      foreground: idOf(foreground),
      background: idOf(background),
      backdrop: backdrop === 'unknown' ? backdrop : backdrop.map(idOf),
    })
  // A name that is not there is no id either.
  const idOf = (name: string) => names.tokenId(name) ?? `{${name}}`
  const found = new Map(pairs.map((pair) => [asDeclared(pair), pair]))
  return [...found].flatMap(([key, pair]) => (declared.has(key) ? [] : [pair]))
}

/** The names in a pair that the system does not have. */
export function missingNames({ names }: SystemIndex, pair: PairInput): string[] {
  const { foreground, background, backdrop = [] } = pair
  const named = [foreground, background, ...(backdrop === 'unknown' ? [] : backdrop)]
  return [...new Set(named)].filter((name) => names.tokenId(name) === undefined)
}
