import type { Oklch } from '#shared/color/oklch.ts'
import { type ColorPlace, placeValue, presentColor } from './color-place.ts'
import type { Evaluation } from './evaluation.ts'
import { gatingRatio, isWide } from './pair-requirements.ts'
import type { ModelFault, SystemSettings, WaiverModel } from './model.ts'
import { type ProbedFinding, type ProbeRow, type ProbeRows, toProbeRows } from './probe-rows.ts'
import { recheck } from './recheck.ts'
import { type MeasuredStack, stackRatio, toUnderlay } from './stack-ratio.ts'
import { createValueProbe, type ValueProbe } from './value-probe.ts'

const VALUES_AN_EVALUATION = 100

/** What a row comes to while a colour is tried: nothing to say, a breach, or one that a waiver covers. */
export const PROBED_PASS = 0
export const PROBED_BREACH = 1
export const PROBED_WAIVED = 2

/**
 * One place of a system in which colours are tried: for each it says what every finding that hangs on the place
 * comes to, exactly as a full check would, and computes nothing else. Its columns are written anew by each `set`.
 */
export interface ColorProbe {
  readonly place: ColorPlace
  /** The colour that the place shows now. */
  readonly present: Oklch
  /** The system with the present colour set in the place: what is shown there is the same, states may follow it now. */
  readonly evaluation: Evaluation
  readonly rows: readonly ProbeRow[]
  readonly values: ValueProbe
  /** Evaluations that one colour counts as: one, or one for each hundred values and findings that hang on it. */
  readonly weight: number
  /** By position in `rows`, the deciding ratio of the last colour. */
  readonly ratios: Float64Array
  /** By position in `rows`, PROBED_…. */
  readonly outcomes: Uint8Array
  /**
   * Tries a colour. The faults, if there are any, make the system unreadable: then the columns say nothing.
   * @throws TypeError for what is no colour: lightness or alpha outside 0 to 1, chroma below 0, or no finite number
   */
  set(color: Oklch): readonly ModelFault[]
}

/** One finding that a tried colour leaves short. */
export interface ProbedBreach {
  readonly finding: ProbedFinding
  readonly ratio: number
}

/** The tokens whose values can follow a token; all of them, where a theme's ground or ink does. */
function followersOf(evaluation: Evaluation, token: string): Iterable<string> {
  const followers = new Set([token])
  for (const id of followers) {
    for (const next of evaluation.dependents.get(id) ?? []) followers.add(next)
  }
  const { themes } = evaluation.resolved.model
  const isRole = themes.some(({ ground, ink }) => followers.has(ground) || followers.has(ink))
  return isRole ? evaluation.resolved.tokens.keys() : followers
}

/** The system with the present colour of a place set there, so that every value has the plan it has with any colour. */
function withColorSet(evaluation: Evaluation, place: ColorPlace, present: Oklch): Evaluation {
  const { model, tokens } = evaluation.resolved
  const base = model.themes[0]!.id
  const token = placeValue(
    tokens.get(place.token)!.token,
    { ...place, base },
    { kind: 'color', color: present },
  )
  const checked = recheck(evaluation, { tokens: { put: [token] } })
  // What is shown stays as it is, so no fault comes of it.
  /* v8 ignore next -- @preserve */
  if (!checked.ok) {
    const detail = checked.faults.map((fault) => fault.detail).join('; ')
    throw new TypeError(`The present color cannot be set in its own place: ${detail}`)
  }
  return checked.evaluation
}

function assertColor({ l, c, h, alpha }: Oklch): void {
  const isUnit = (part: number | null) => part === null || (part >= 0 && part <= 1)
  const isChroma = c === null || (c >= 0 && Number.isFinite(c))
  if (isUnit(l) && isUnit(alpha) && isChroma && (h === null || Number.isFinite(h))) return
  throw new TypeError(`oklch(${l} ${c} ${h} / ${alpha}) is no color`)
}

type Sides = NonNullable<ProbeRow['sides']>

function createMeasuring(settings: SystemSettings): (sides: Sides) => number {
  let stack: MeasuredStack | undefined
  return (sides) => {
    const foreground = sides.foreground[sides.foregroundAt]!.color.rendered
    const background = sides.background[sides.backgroundAt]!.color.rendered
    const { isLaidOn } = sides
    stack ??= { foreground, background, underlay: sides.underlay.value, isLaidOn }
    stack.foreground = foreground
    stack.background = background
    stack.underlay = sides.underlay.value
    stack.isLaidOn = isLaidOn
    const srgb = stackRatio(stack, 'srgb')
    if (!settings.p3 || !settings.p3Gates || !isWide(stack)) return srgb
    return gatingRatio(srgb, stackRatio(stack, 'p3'), settings)
  }
}

/** Lays groups and waivers over the ratios. */
function judgeRows(
  { rows, groupsMet }: ProbeRows,
  ratios: Float64Array,
  outcomes: Uint8Array,
): void {
  const met = [...groupsMet]
  for (const [at, row] of rows.entries()) {
    if (row.group < 0 || row.sides === undefined) continue
    if (row.groupRequired > 0 && ratios[at]! >= row.groupRequired) met[row.group] = true
  }
  for (const [at, row] of rows.entries()) {
    const ratio = ratios[at]!
    if (ratio >= row.threshold || met[row.group]) outcomes[at] = PROBED_PASS
    else outcomes[at] = ratio >= row.waivedFrom ? PROBED_WAIVED : PROBED_BREACH
  }
}

/**
 * Lays out one place of a system to try colours in.
 * @param options.waivers granted and in force; what they cover is no breach
 * @throws TypeError when the system has no such token or theme
 */
export function createColorProbe(
  evaluation: Evaluation,
  place: ColorPlace,
  options: { readonly waivers?: readonly WaiverModel[] } = {},
): ColorProbe {
  const present = presentColor(evaluation.resolved, place)
  const placed = withColorSet(evaluation, place, present)
  const values = createValueProbe(placed.resolved, place, followersOf(placed, place.token))
  const probeRows = toProbeRows(placed, values, options.waivers ?? [])
  const { rows, underlays } = probeRows
  const ratios = Float64Array.from(rows, (row) => row.ratio)
  const outcomes = new Uint8Array(rows.length)
  const measure = createMeasuring(placed.resolved.model.settings)
  return {
    place,
    present,
    evaluation: placed,
    rows,
    values,
    weight: Math.ceil((values.count + rows.length) / VALUES_AN_EVALUATION),
    ratios,
    outcomes,
    set(color) {
      assertColor(color)
      const faults = values.set(color)
      if (faults.length > 0) return faults
      for (const underlay of underlays) {
        underlay.value = toUnderlay(
          underlay.layers.map(({ cells, at }) => cells[at]!.color.rendered),
          underlay.isUnknown,
        )
      }
      for (const [at, row] of rows.entries()) {
        if (row.sides !== undefined) ratios[at] = measure(row.sides)
      }
      judgeRows(probeRows, ratios, outcomes)
      return faults
    },
  }
}

/** The breaches of the colour tried last, one an identity, the one furthest short first. */
export function breachesOf(probe: ColorProbe): ProbedBreach[] {
  const breaches: ProbedBreach[] = []
  for (const [at, row] of probe.rows.entries()) {
    if (probe.outcomes[at] !== PROBED_BREACH) continue
    breaches.push({ finding: row.finding, ratio: probe.ratios[at]! })
  }
  breaches.sort((a, b) => a.ratio / a.finding.required - b.ratio / b.finding.required)
  const seen = new Set<string>()
  return breaches.filter(({ finding }) => {
    const isFirst = !seen.has(finding.identity)
    seen.add(finding.identity)
    return isFirst
  })
}
