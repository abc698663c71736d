import type { PairModel } from './model.ts'

/**
 * What a pair declares, as text: a system declares it once. States, themes, level, minimum and exemption only
 * qualify a declaration.
 */
export function declarationOf(pair: PairModel): string {
  const { foreground, background, backdrop, use, relation, anyOf = null, product = null } = pair
  return JSON.stringify([foreground, background, backdrop, use, relation, anyOf, product])
}
