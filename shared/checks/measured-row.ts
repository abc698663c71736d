import { type Evaluation, type PairMeasure, ROW_UNDER_FLOOR } from './evaluation.ts'
import { identityOf } from './identity.ts'
import { STATES, type State, type ThemeModel } from './model.ts'
import { STATE_COUNT } from './resolved.ts'

/** Position in a table of all themes and fg/bg states. */
export function placeOfRow(measure: PairMeasure, row: number): number {
  const width = measure.combinations.length
  const at = row % width
  const theme = measure.themes[(row - at) / width]!
  return theme * STATE_COUNT * STATE_COUNT + measure.combinations[at]!
}

/** The theme of a row. */
export function themeOfRow(evaluation: Evaluation, measure: PairMeasure, row: number): ThemeModel {
  const at = Math.floor(row / measure.combinations.length)
  return evaluation.resolved.model.themes[measure.themes[at]!]!
}

/** The fg/bg state of a row. */
export function statesOfRow(
  measure: PairMeasure,
  row: number,
): { readonly foreground: State; readonly background: State } {
  const combination = measure.combinations[row % measure.combinations.length]!
  return {
    foreground: STATES[Math.floor(combination / STATE_COUNT)]!,
    background: STATES[combination % STATE_COUNT]!,
  }
}

/** What a row must reach: the floor for disabled where it lies under it, else what its use asks for. */
export function requiredOfRow(evaluation: Evaluation, measure: PairMeasure, row: number): number {
  if (measure.status[row] === ROW_UNDER_FLOOR) {
    return evaluation.resolved.model.settings.disabledFloor!
  }
  return measure.required[Math.floor(row / measure.combinations.length)]!
}

/** How far a row is from what it must reach: below 1 is short, and the lower the further. */
export function reachOfRow(evaluation: Evaluation, measure: PairMeasure, row: number): number {
  return measure.ratio[row]! / requiredOfRow(evaluation, measure, row)
}

/** The identity of a row's finding. */
export function identityOfRow(evaluation: Evaluation, measure: PairMeasure, row: number): string {
  const theme = themeOfRow(evaluation, measure, row)
  const states = statesOfRow(measure, row)
  const { foreground, background, backdrop } = measure.pair
  return identityOf({
    foreground,
    background,
    backdrop,
    ground: theme.ground,
    kind: measure.kind,
    theme: theme.id,
    foregroundState: states.foreground,
    backgroundState: states.background,
  })
}
