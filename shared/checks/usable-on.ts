import type { Evaluation, PairMeasure } from './evaluation.ts'
import { ROW_EXEMPT, ROW_UNDER_FLOOR } from './evaluation.ts'
import { measurePair } from './measure-pair.ts'
import { statesOfRow } from './measured-row.ts'
import type { PairModel, State, Use } from './model.ts'
import type { ResolvedSystem } from './resolved.ts'
import { effectiveLevel, requiredRatio } from './uses.ts'

/** The uses a token can stand on a background for, from the one that asks most. */
const STANDING_USES = ['text', 'large-text', 'non-text'] as const satisfies readonly Use[]

/** How a token stands on a background, whether or not anybody declared the pair. */
export interface UsableToken {
  /** Token id. */
  readonly token: string
  /** The uses whose ratio it reaches in every theme and in every state that the two can be in. */
  readonly uses: readonly (typeof STANDING_USES)[number][]
  /** Where it has least: theme id, states, and the ratio, never rounded. */
  readonly lowest: {
    readonly theme: string
    readonly foregroundState: State
    readonly backgroundState: State
    readonly ratio: number
  }
}

/** Where the two are to be together; absent members: everywhere. */
export type StandingPlace = Pick<PairModel, 'themes' | 'states'>

function undeclared(foreground: string, background: string, place: StandingPlace): PairModel {
  return {
    id: '',
    foreground,
    background,
    use: 'text',
    relation: 'inside',
    backdrop: [],
    ...place,
  }
}

function isMeasured(measure: PairMeasure, row: number): boolean {
  return measure.status[row] !== ROW_EXEMPT && measure.status[row] !== ROW_UNDER_FLOOR
}

/** Whether every row that counts reaches what a use asks for in its theme. */
function reaches(resolved: ResolvedSystem, measure: PairMeasure, use: Use): boolean {
  const { settings, themes } = resolved.model
  return measure.ratio.every((ratio, row) => {
    const theme = themes[measure.themes[Math.floor(row / measure.combinations.length)]!]!
    const level = effectiveLevel(settings.level, theme.level)
    return !isMeasured(measure, row) || ratio >= requiredRatio(use, level)
  })
}

function lowestRow(measure: PairMeasure): number {
  let lowest = -1
  for (let row = 0; row < measure.ratio.length; row++) {
    if (!isMeasured(measure, row)) continue
    if (lowest < 0 || measure.ratio[row]! < measure.ratio[lowest]!) lowest = row
  }
  return lowest
}

/**
 * Which tokens may stand on a background, for which use, in every theme and state: disabled ones, which WCAG exempts,
 * left out. In ledger order, without the background itself.
 * @param place themes by id, and states of both sides, as a pair has them: rest is always in
 * @throws TypeError when the system has no such token
 */
export function usableOn(
  { resolved }: Evaluation,
  background: string,
  place: StandingPlace = {},
): UsableToken[] {
  const { model, tokens } = resolved
  if (!tokens.has(background)) throw new TypeError(`No token ${background}`)
  if (model.themes.length === 0) return []
  return model.tokens
    .filter(({ id }) => id !== background)
    .map(({ id }) => {
      const measure = measurePair(resolved, undeclared(id, background, place))
      const row = lowestRow(measure)
      const states = statesOfRow(measure, row)
      const theme = measure.themes[Math.floor(row / measure.combinations.length)]!
      return {
        token: id,
        uses: STANDING_USES.filter((use) => reaches(resolved, measure, use)),
        lowest: {
          theme: model.themes[theme]!.id,
          foregroundState: states.foreground,
          backgroundState: states.background,
          ratio: measure.ratio[row]!,
        },
      }
    })
}
