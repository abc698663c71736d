import { type NearestResult, searchNearest } from '#shared/color/nearest-search.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { ColorPlace } from './color-place.ts'
import { type ColorProbe, createColorProbe } from './color-probe.ts'
import type { Evaluation } from './evaluation.ts'
import type { WaiverModel } from './model.ts'
import type { ProbeRow } from './probe-rows.ts'
import { createProbeTrial } from './probe-trial.ts'

/** Evaluations that a search for one token may take, unless told otherwise; see `ColorProbe.weight`. */
export const NEAREST_BUDGET = 8000

/** A waived finding is made to pass too where that costs no more than this, in ΔE OK. */
const FREE_DIFFERENCE = 0.001

/** A colour to be set in a place. */
export interface PlacedColor {
  readonly place: ColorPlace
  readonly color: Oklch
  /** The largest rendered ΔE OK of the token over themes and states. */
  readonly deltaEOk: number
}

/** What a search in one place is allowed and asked. */
export interface NearestAtOptions {
  readonly waivers?: readonly WaiverModel[]
  /** Evaluations, at most. */
  readonly budget?: number
  /** Which rows have to pass; default: every one that gates. */
  readonly isAsked?: (row: ProbeRow) => boolean
}

/** What a search in one place came to. */
export interface NearestAt {
  readonly found?: PlacedColor
  readonly evaluations: number
  readonly isStopped: boolean
  readonly probe: ColorProbe
}

/** Whether a finding fails a check. */
export function isGatingRow(row: ProbeRow): boolean {
  return row.finding.gating
}

/** Of the nearest with waivers and the nearest without: the latter where it is as near. */
function freest(accepting: NearestResult, strict: NearestResult | undefined): NearestResult {
  const evaluations = accepting.evaluations + (strict?.evaluations ?? 0)
  const isFree =
    strict?.found !== undefined &&
    accepting.found !== undefined &&
    strict.found.cost <= accepting.found.cost + FREE_DIFFERENCE
  return { ...(isFree ? strict : accepting), evaluations }
}

/**
 * The colour nearest to what a place shows, hue and alpha kept, with which every asked finding that hangs on the
 * place passes or is waived, and no distinct set gets worse.
 * @throws TypeError when the system has no such token or theme
 */
export function nearestAt(
  evaluation: Evaluation,
  place: ColorPlace,
  options: NearestAtOptions = {},
): NearestAt {
  const { waivers = [], budget = NEAREST_BUDGET, isAsked = isGatingRow } = options
  const probe = createColorProbe(evaluation, place, { waivers })
  const gamut = evaluation.resolved.model.settings.p3 ? 'p3' : 'srgb'
  const search = (acceptsWaivers: boolean, left: number) =>
    searchNearest({
      start: probe.present,
      gamut,
      trial: createProbeTrial(evaluation, probe, { isAsked, acceptsWaivers }),
      budget: Math.floor(left / probe.weight),
    })
  const accepting = search(true, budget)
  const hasWaived = probe.rows.some(({ waivedFrom }) => Number.isFinite(waivedFrom))
  const left = budget - accepting.evaluations * probe.weight
  const strict = hasWaived && accepting.found && left > 0 ? search(false, left) : undefined
  const { found, evaluations, isStopped } = freest(accepting, strict)
  return {
    ...(found ? { found: { place, color: found.color, deltaEOk: found.cost } } : {}),
    evaluations: evaluations * probe.weight,
    isStopped,
    probe,
  }
}
