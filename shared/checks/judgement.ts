import {
  type Evaluation,
  type PairMeasure,
  ROW_EXEMPT,
  ROW_MET,
  ROW_UNDER_FLOOR,
} from './evaluation.ts'
import { exemptionOf } from './pair-requirements.ts'
import {
  identityOfRow,
  placeOfRow,
  requiredOfRow,
  statesOfRow,
  themeOfRow,
} from './measured-row.ts'
import type { ContrastKind, Outcome, WaiverModel } from './model.ts'

/** What decides beside the measurements. */
export interface JudgementOptions {
  /** Granted and in force now. */
  readonly waivers?: readonly WaiverModel[]
  /** By identity, the ratio of each breach in what is compared with: what was a breach there is `known`. */
  readonly known?: ReadonlyMap<string, number>
}

/** The outcome of one row, and why. */
export interface Judgement {
  readonly outcome: Outcome
  readonly reason?: string
  readonly waiver?: WaiverModel
}

const BREACH: Judgement = { outcome: 'breach' }
const PASS: Judgement = { outcome: 'pass' }
const PASS_ANY_OF: Judgement = { outcome: 'pass', reason: 'any-of' }
const PASS_UNKNOWN: Judgement = { outcome: 'pass', reason: 'backdrop-unknown' }
const EXEMPT = new Map<string, Judgement>(
  ['disabled', 'logotype', 'decorative', 'inactive'].map((reason) => [
    reason,
    { outcome: 'exempt', reason },
  ]),
)

/** Judges rows of an evaluation by their position. */
export type Judge = (measure: PairMeasure, row: number) => Judgement

function waiverKey(foreground: string, background: string, kind: ContrastKind): string {
  return JSON.stringify([foreground, background, kind])
}

/** The waiver that covers a row, of several the one that ends last. */
type FindWaiver = (measure: PairMeasure, row: number) => WaiverModel | undefined

function createWaiverSearch(evaluation: Evaluation, waivers: readonly WaiverModel[]): FindWaiver {
  if (waivers.length === 0) return () => undefined
  const bySubject = new Map<string, WaiverModel[]>()
  for (const waiver of waivers) {
    const key = waiverKey(waiver.foreground, waiver.background, waiver.kind)
    bySubject.set(key, [...(bySubject.get(key) ?? []), waiver])
  }
  const isAbsentOr = (wanted: string | undefined, is: string) =>
    wanted === undefined || wanted === is
  return (measure, row) => {
    const { foreground, background } = measure.pair
    const candidates = bySubject.get(waiverKey(foreground, background, measure.kind))
    if (candidates === undefined) return undefined
    const theme = themeOfRow(evaluation, measure, row).id
    const states = statesOfRow(measure, row)
    const required = requiredOfRow(evaluation, measure, row)
    const ratio = measure.ratio[row]!
    const covering = candidates.filter(
      (waiver) =>
        isAbsentOr(waiver.theme, theme) &&
        isAbsentOr(waiver.foregroundState, states.foreground) &&
        isAbsentOr(waiver.backgroundState, states.background) &&
        ratio >= waiver.floorRatio &&
        required <= waiver.required,
    )
    return covering.toSorted((a, b) => Date.parse(b.endsAt) - Date.parse(a.endsAt))[0]
  }
}

function breachReason(measure: PairMeasure, row: number): string | undefined {
  if (measure.status[row] === ROW_UNDER_FLOOR) return 'disabled-floor'
  return measure.pair.backdrop === 'unknown' ? 'backdrop-unknown' : undefined
}

/** Lays groups, waivers and the comparison over what was measured. */
export function createJudge(evaluation: Evaluation, options: JudgementOptions = {}): Judge {
  const findWaiver = createWaiverSearch(evaluation, options.waivers ?? [])
  const { known } = options
  return (measure, row) => {
    const status = measure.status[row]
    const { pair } = measure
    if (status === ROW_MET) return pair.backdrop === 'unknown' ? PASS_UNKNOWN : PASS
    if (status === ROW_EXEMPT) {
      const combination = measure.combinations[row % measure.combinations.length]!
      return EXEMPT.get(exemptionOf(pair, combination)!)!
    }
    if (pair.anyOf !== undefined && evaluation.anyOf.get(pair.anyOf)![placeOfRow(measure, row)]) {
      return PASS_ANY_OF
    }
    const reason = breachReason(measure, row)
    const why = reason === undefined ? {} : { reason }
    const waiver = findWaiver(measure, row)
    if (waiver !== undefined) return { outcome: 'waived', ...why, waiver }
    const before = known?.get(identityOfRow(evaluation, measure, row))
    const isKnown = before !== undefined && measure.ratio[row]! >= before
    if (!isKnown && reason === undefined) return BREACH
    return { outcome: isKnown ? 'known' : 'breach', ...why }
  }
}
