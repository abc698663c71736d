import type { PairMeasure } from './evaluation.ts'
import { placeOfRow } from './measured-row.ts'
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
