import { renderedDifference } from '#shared/color/rendered-difference.ts'
import type { ColorTrial } from '#shared/color/nearest-search.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import type { ColorProbe } from './color-probe.ts'
import { DISTINCT_VIEWS, type DistinctMeasure, measureSetInTheme } from './distinct-measure.ts'
import type { Evaluation } from './evaluation.ts'
import { stateAt } from './model-graph.ts'
import type { DistinctSet } from './model.ts'
import type { ProbeRow } from './probe-rows.ts'
import { STATE_COUNT } from './resolved.ts'

/** Which findings a colour has to leave passing. */
export interface TrialDemand {
  /** Whether a row has to pass; one that has not is free. */
  readonly isAsked: (row: ProbeRow) => boolean
  /** Whether a waiver is as good as passing. */
  readonly acceptsWaivers: boolean
}

/** Measures of distinct sets get worse only by more than conversions stray. */
const DISTINCT_TOLERANCE = 1e-9

/** How far each row is from passing, as the logarithm of required over measured; groups count by their best member. */
function shortOf(probe: ColorProbe, demand: TrialDemand): number {
  const { rows, ratios } = probe
  const groups: number[] = []
  for (const [at, row] of rows.entries()) {
    if (row.group < 0 || !(row.groupRequired > 0)) continue
    const short = Math.log(row.groupRequired / ratios[at]!)
    groups[row.group] = Math.min(groups[row.group] ?? Number.POSITIVE_INFINITY, short)
  }
  let worst = Number.NEGATIVE_INFINITY
  for (const [at, row] of rows.entries()) {
    if (row.threshold === 0 || !demand.isAsked(row)) continue
    const needed = demand.acceptsWaivers ? Math.min(row.threshold, row.waivedFrom) : row.threshold
    const own = Math.log(needed / ratios[at]!)
    const short = row.group < 0 ? own : Math.min(own, groups[row.group] ?? own)
    if (short > worst) worst = short
  }
  return worst
}

/** A distinct set that a colour can move, and what it measured before. */
interface WatchedSet {
  readonly set: DistinctSet
  readonly theme: number
  readonly before: DistinctMeasure
}

function watchedSets(before: Evaluation, probe: ColorProbe): WatchedSet[] {
  const { themes, distinctSets = [] } = before.resolved.model
  const cellsOf = (id: string) => before.resolved.tokens.get(id)!.cells
  return distinctSets.flatMap((set) =>
    [...themes.keys()]
      .filter((theme) =>
        [themes[theme]!.ground, ...set.tokens].some((id) =>
          probe.values.reaches(id, theme * STATE_COUNT),
        ),
      )
      .map((theme) => {
        const { ground } = themes[theme]!
        return { set, theme, before: measureSetInTheme({ set, theme, ground, cellsOf }) }
      }),
  )
}

function isAnySetWorse(probe: ColorProbe, watched: readonly WatchedSet[]): boolean {
  const { themes } = probe.evaluation.resolved.model
  const { cellsOf } = probe.values
  return watched.some(({ set, theme, before }) => {
    const now = measureSetInTheme({ set, theme, ground: themes[theme]!.ground, cellsOf })
    return DISTINCT_VIEWS.some(
      (view) => now[view].deltaE2000 < before[view].deltaE2000 - DISTINCT_TOLERANCE,
    )
  })
}

interface ComparedCell {
  readonly at: number
  readonly before: RenderedColor
}

/** The token's own values that the place moves, as they were. */
function comparedCells(before: Evaluation, probe: ColorProbe): ComparedCell[] {
  const { token } = probe.place
  const { cells, states } = before.resolved.tokens.get(token)!
  const now = probe.evaluation.resolved.tokens.get(token)!.states
  return before.resolved.model.themes.flatMap((_, theme) =>
    now
      .map((state) => ({ state, at: theme * STATE_COUNT + stateAt(state) }))
      .filter(({ state, at }) => states.includes(state) && probe.values.reaches(token, at))
      .map(({ at }) => ({ at, before: cells[at]!.color.rendered })),
  )
}

/**
 * Tries colours in a place for a search: the cost is the largest rendered ΔE OK of the token over themes and states,
 * then their sum; what passes leaves everything asked for passing and no distinct set worse.
 * @param before the system as it stands
 * @param probe of a place in it
 */
export function createProbeTrial(
  before: Evaluation,
  probe: ColorProbe,
  demand: TrialDemand,
): (color: Oklch) => ColorTrial {
  const withP3 = before.resolved.model.settings.p3
  const compared = comparedCells(before, probe)
  const watched = watchedSets(before, probe)
  return (color) => {
    const faults = probe.set(color)
    const cells = probe.values.cellsOf(probe.place.token)
    let cost = 0
    let sum = 0
    for (const { at, before: was } of compared) {
      const difference = renderedDifference(was, cells[at]!.color.rendered, withP3)
      sum += difference
      if (difference > cost) cost = difference
    }
    const spanShort = Math.log(probe.values.spanShortage())
    if (faults.length > 0) return { cost, sum, short: Math.max(spanShort, 0), isBarred: true }
    const short = Math.max(spanShort, shortOf(probe, demand))
    const isBarred = short <= 0 && watched.length > 0 && isAnySetWorse(probe, watched)
    return { cost, sum, short, ...(isBarred ? { isBarred } : {}) }
  }
}
