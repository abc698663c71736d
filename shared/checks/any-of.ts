import type { Evaluation, PairMeasure } from './evaluation.ts'
import { placeOfRow } from './measured-row.ts'
import type { Finding, PairModel } from './model.ts'
import { combinationOf } from './pair-states.ts'
import { STATE_COUNT } from './resolved.ts'

/** Marks where a member meets its own requirement by its ratio; one that requires nothing meets nothing. */
function markMet(met: Uint8Array, measure: PairMeasure): void {
  const width = measure.combinations.length
  for (let row = 0; row < measure.ratio.length; row++) {
    const required = measure.required[Math.floor(row / width)]!
    if (required > 0 && measure.ratio[row]! >= required) met[placeOfRow(measure, row)] = 1
  }
}

/**
 * For each `anyOf` group, the themes and fg/bg states in which one member is enough.
 * @param names only these groups; absent: all
 * @see https://www.w3.org/WAI/WCAG22/Techniques/css/C40 a two-colour indicator, of which one band has contrast
 */
export function meetAnyOf(
  measures: readonly PairMeasure[],
  themeCount: number,
  names?: ReadonlySet<string>,
): Map<string, Uint8Array> {
  const groups = new Map<string, Uint8Array>()
  for (const measure of measures) {
    const name = measure.pair.anyOf
    if (name === undefined || (names !== undefined && !names.has(name))) continue
    let met = groups.get(name)
    if (met === undefined) {
      met = new Uint8Array(themeCount * STATE_COUNT * STATE_COUNT)
      groups.set(name, met)
    }
    markMet(met, measure)
  }
  return groups
}

/**
 * The pair that meets its own requirement in the place of a finding that passes by its group: of several the one that
 * has the most to spare.
 * @returns undefined where none does, as for a finding that no group lets pass
 */
export function standInFor(evaluation: Evaluation, finding: Finding): PairModel | undefined {
  const theme = evaluation.resolved.themes.get(finding.theme)
  const declared = new Set(finding.pairs)
  const groups = new Set(
    evaluation.measures.flatMap(({ pair }) => (declared.has(pair.id) ? [pair.anyOf] : [])),
  )
  const combination = combinationOf(finding.foregroundState, finding.backgroundState)
  let best: { readonly pair: PairModel; readonly reach: number } | undefined
  for (const { pair, themes, combinations, required, ratio } of evaluation.measures) {
    if (pair.anyOf === undefined || !groups.has(pair.anyOf)) continue
    const at = themes.indexOf(theme ?? -1)
    const place = combinations.indexOf(combination)
    if (at < 0 || place < 0 || required[at] === 0) continue
    const reach = ratio[at * combinations.length + place]! / required[at]!
    if (reach >= 1 && reach > (best?.reach ?? 0)) best = { pair, reach }
  }
  return best?.pair
}
