import { type Evaluation, type PairMeasure, ROW_SHORT, ROW_UNDER_FLOOR } from './evaluation.ts'
import { exemptionOf, isLaidOn, requiredIn, thresholdOf } from './pair-requirements.ts'
import { identityOfRow, placeOfRow, statesOfRow, themeOfRow } from './measured-row.ts'
import type { ContrastKind, State, Use, WaiverModel } from './model.ts'
import { type ResolvedCell, STATE_COUNT } from './resolved.ts'
import { toUnderlay, type Underlay } from './stack-ratio.ts'
import type { ValueProbe } from './value-probe.ts'

/** What is asked of two tokens in one theme and state, and hangs on the probed colour. Everything by id. */
export interface ProbedFinding {
  readonly identity: string
  readonly pair: string
  readonly foreground: string
  readonly background: string
  readonly theme: string
  readonly foregroundState: State
  readonly backgroundState: State
  readonly use: Use
  readonly kind: ContrastKind
  /** What the ratio must reach: the requirement, or the system's floor where the finding is exempt. */
  readonly required: number
  readonly gating: boolean
}

/** What lies under a pair in one theme, read anew where a layer of it can move. */
export interface ProbeUnderlay {
  readonly layers: readonly { readonly cells: readonly ResolvedCell[]; readonly at: number }[]
  readonly isUnknown: boolean
  /** Whether what can be seen of it can move. */
  readonly canMove: boolean
  value: Underlay
}

/** One finding as the probe measures it. */
export interface ProbeRow {
  readonly finding: ProbedFinding
  /** Absent where only its group can move: then the ratio stands. */
  readonly sides?: {
    readonly foreground: readonly ResolvedCell[]
    readonly foregroundAt: number
    readonly background: readonly ResolvedCell[]
    readonly backgroundAt: number
    readonly underlay: ProbeUnderlay
    readonly isLaidOn: boolean
  }
  /** The ratio before any colour is tried. */
  readonly ratio: number
  /** 0 where nothing can fail. */
  readonly threshold: number
  /** What counts for a group; 0 where the pair requires nothing. */
  readonly groupRequired: number
  /** Position in the groups, -1 for none. */
  readonly group: number
  /** From this ratio on a waiver covers what is short; infinite where none does. */
  readonly waivedFrom: number
}

/** The rows of a probe, and for each place of an `anyOf` group whether a row that cannot move meets it. */
export interface ProbeRows {
  readonly rows: readonly ProbeRow[]
  readonly underlays: readonly ProbeUnderlay[]
  readonly groupsMet: readonly boolean[]
}

interface Draft {
  readonly evaluation: Evaluation
  readonly probe: ValueProbe
  readonly waivers: readonly WaiverModel[]
  readonly rows: ProbeRow[]
  readonly underlays: ProbeUnderlay[]
  readonly groupAt: Map<string, number>
  readonly groupsMet: boolean[]
  /** Row and pair of every row that can move. */
  readonly moving: Set<string>
}

function underlayOf(draft: Draft, measure: PairMeasure, theme: number): ProbeUnderlay {
  const { probe, evaluation } = draft
  const { backdrop } = measure.pair
  const isUnknown = backdrop === 'unknown'
  const ids = isUnknown ? [] : [evaluation.resolved.model.themes[theme]!.ground, ...backdrop]
  const at = theme * STATE_COUNT
  const layers = ids.map((id) => ({ cells: probe.cellsOf(id), at }))
  const value = toUnderlay(
    layers.map(({ cells }) => cells[at]!.color.rendered),
    isUnknown,
  )
  const lowestSeen = layers.findLastIndex(
    ({ cells }, layer) => cells[at]!.color.rendered.a === 255 && !probe.reaches(ids[layer]!, at),
  )
  const canMove = ids.slice(lowestSeen + 1).some((id) => probe.reaches(id, at))
  const underlay = { layers, isUnknown, canMove, value }
  if (canMove) draft.underlays.push(underlay)
  return underlay
}

type Sides = NonNullable<ProbeRow['sides']>

/** Whether a row can move: by a side of it, or by what shows through one. */
function canMove(probe: ValueProbe, measure: PairMeasure, sides: Sides): boolean {
  const { foreground, foregroundAt, background, backgroundAt, underlay, isLaidOn: onIt } = sides
  const { pair } = measure
  if (probe.reaches(pair.foreground, foregroundAt)) return true
  if (probe.reaches(pair.background, backgroundAt)) return true
  if (!underlay.canMove) return false
  const alphaOf = (cells: readonly ResolvedCell[], at: number) => cells[at]!.color.rendered.a
  return (
    alphaOf(background, backgroundAt) < 255 || (!onIt && alphaOf(foreground, foregroundAt) < 255)
  )
}

function waivedFrom(
  draft: Draft,
  finding: Omit<ProbedFinding, 'identity' | 'pair' | 'use' | 'gating'>,
): number {
  const covering = draft.waivers.filter(
    (waiver) =>
      waiver.foreground === finding.foreground &&
      waiver.background === finding.background &&
      waiver.kind === finding.kind &&
      (waiver.theme ?? finding.theme) === finding.theme &&
      (waiver.foregroundState ?? finding.foregroundState) === finding.foregroundState &&
      (waiver.backgroundState ?? finding.backgroundState) === finding.backgroundState &&
      finding.required <= waiver.required,
  )
  return Math.min(Number.POSITIVE_INFINITY, ...covering.map((waiver) => waiver.floorRatio))
}

/** The position of a row's group in its theme and state; -1 where it is in none. */
function groupOf(draft: Draft, measure: PairMeasure, row: number): number {
  const { anyOf } = measure.pair
  if (anyOf === undefined) return -1
  const key = `${placeOfRow(measure, row)} ${anyOf}`
  const known = draft.groupAt.get(key)
  if (known !== undefined) return known
  draft.groupAt.set(key, draft.groupsMet.length)
  draft.groupsMet.push(false)
  return draft.groupsMet.length - 1
}

interface Place {
  readonly measure: PairMeasure
  readonly row: number
  readonly theme: number
  readonly combination: number
}

function toRow(draft: Draft, place: Place, sides: ProbeRow['sides']): ProbeRow {
  const { evaluation } = draft
  const { measure, row, combination } = place
  const { pair, kind } = measure
  const theme = themeOfRow(evaluation, measure, row)
  const states = statesOfRow(measure, row)
  const { settings } = evaluation.resolved.model
  const use = requiredIn(evaluation.resolved, pair, place.theme)
  const threshold = thresholdOf(exemptionOf(pair, combination), use, settings) ?? 0
  const subject = {
    foreground: pair.foreground,
    background: pair.background,
    theme: theme.id,
    foregroundState: states.foreground,
    backgroundState: states.background,
    kind,
    required: threshold,
  }
  const identity = identityOfRow(evaluation, measure, row)
  return {
    finding: { ...subject, identity, pair: pair.id, use: pair.use, gating: theme.gating },
    ...(sides ? { sides } : {}),
    ratio: measure.ratio[row]!,
    threshold,
    groupRequired: use,
    group: groupOf(draft, measure, row),
    waivedFrom: waivedFrom(draft, subject),
  }
}

/** Adds the rows of a pair that can move. */
function addMoving(draft: Draft, measure: PairMeasure): void {
  const { probe } = draft
  const { pair, combinations } = measure
  const foreground = probe.cellsOf(pair.foreground)
  const background = probe.cellsOf(pair.background)
  for (const [at, theme] of measure.themes.entries()) {
    const underlay = underlayOf(draft, measure, theme)
    for (const [position, combination] of combinations.entries()) {
      const sides = {
        foreground,
        foregroundAt: theme * STATE_COUNT + Math.floor(combination / STATE_COUNT),
        background,
        backgroundAt: theme * STATE_COUNT + (combination % STATE_COUNT),
        underlay,
        isLaidOn: isLaidOn(pair.use),
      }
      if (!canMove(probe, measure, sides)) continue
      const row = at * combinations.length + position
      draft.moving.add(`${row} ${pair.id}`)
      const added = toRow(draft, { measure, row, theme, combination }, sides)
      if (added.threshold > 0 || added.group >= 0) draft.rows.push(added)
    }
  }
}

/** Adds what cannot move but stands or falls with a group that can, and notes where such a row meets its own. */
function addStanding(draft: Draft, measure: PairMeasure): void {
  const { combinations, pair } = measure
  for (let row = 0; row < measure.ratio.length; row++) {
    const group = draft.groupAt.get(`${placeOfRow(measure, row)} ${pair.anyOf}`)
    if (group === undefined || draft.moving.has(`${row} ${pair.id}`)) continue
    const at = Math.floor(row / combinations.length)
    const required = measure.required[at]!
    if (required > 0 && measure.ratio[row]! >= required) draft.groupsMet[group] = true
    const status = measure.status[row]
    if (status !== ROW_SHORT && status !== ROW_UNDER_FLOOR) continue
    const combination = combinations[row % combinations.length]!
    const place = { measure, row, theme: measure.themes[at]!, combination }
    draft.rows.push(toRow(draft, place, undefined))
  }
}

/** Positions of the pairs that can show a moving value. A theme's ground lies under every pair. */
function pairsShowing(evaluation: Evaluation, probe: ValueProbe): Iterable<number> {
  const isGroundMoving = evaluation.resolved.model.themes.some(({ ground }, theme) =>
    probe.reaches(ground, theme * STATE_COUNT),
  )
  if (isGroundMoving) return evaluation.measures.keys()
  return [...new Set(probe.tokens.flatMap((id) => evaluation.pairsOf.get(id) ?? []))].sort(
    (a, b) => a - b,
  )
}

/**
 * Every finding that hangs on the probed place, with what stands or falls with it through an `anyOf` group.
 * @param evaluation in which a colour is set at that place
 */
export function toProbeRows(
  evaluation: Evaluation,
  probe: ValueProbe,
  waivers: readonly WaiverModel[],
): ProbeRows {
  const draft: Draft = {
    evaluation,
    probe,
    waivers,
    rows: [],
    underlays: [],
    groupAt: new Map(),
    groupsMet: [],
    moving: new Set(),
  }
  for (const position of pairsShowing(evaluation, probe)) {
    addMoving(draft, evaluation.measures[position]!)
  }
  if (draft.groupAt.size > 0) {
    for (const measure of evaluation.measures) {
      if (measure.pair.anyOf !== undefined) addStanding(draft, measure)
    }
  }
  return { rows: draft.rows, underlays: draft.underlays, groupsMet: draft.groupsMet }
}
