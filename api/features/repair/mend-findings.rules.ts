import { createColorProbe } from '#shared/checks/color-probe.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding, WaiverModel } from '#shared/checks/model.ts'
import { isGatingRow } from '#shared/checks/nearest-at.ts'
import { withColors } from '#shared/checks/nearest-passing.ts'
import { createProbeTrial } from '#shared/checks/probe-trial.ts'
import { type LeftBreach, type RepairEdit, repairPlan } from '#shared/checks/repair-plan.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Oklch } from '#shared/color/oklch.ts'

/** What a failing check asks: how its breaches would pass. */
export interface MendAsk {
  readonly waivers: readonly WaiverModel[]
  /** By identity, what breached before and may stay: no lower than this. */
  readonly known?: ReadonlyMap<string, number>
  /** Token ids that never move. */
  readonly locked: ReadonlySet<string>
  /** Token ids that the caller sent: another one moves only where none of these would do. */
  readonly own?: ReadonlySet<string>
  /** Evaluations, at most. */
  readonly budget: number
  /** Called after each search with the evaluations so far. */
  readonly onSpent?: (evaluations: number) => void
}

/** Colours that pass together, and what they leave. */
export interface Mended {
  readonly edits: readonly RepairEdit[]
  readonly left: readonly LeftBreach[]
}

/** Breaches that are searched, those furthest short first. */
const MOST_FINDINGS = 20
/** Every step judges all findings a few times: where there are more of them, fewer breaches are searched. */
const MOST_JUDGED = 800_000

/** What the sent tokens may use of the budget before others move. */
const OWN_SHARE = 0.7

/** A color that is written with so many decimals is copied by hand. */
const SHORTEST_DECIMALS = [4, 5, 6]

/**
 * The nearest colours with which the gating breaches of a check pass, the 20 furthest short; all of them hold
 * together. What is known or not searched for gets no worse.
 */
export function mendFindings(evaluation: Evaluation, ask: MendAsk): Mended {
  const { known, locked, own, budget, onSpent = () => {} } = ask
  const judging = known === undefined ? ask : { ...ask, known }
  const { counts, findings } = verdictOf(evaluation, { ...judging, include: 'not-pass' })
  const judged = Object.values(counts).reduce((sum, count) => sum + count, 0)
  const most = Math.max(1, Math.min(MOST_FINDINGS, Math.floor(MOST_JUDGED / judged)))
  const asked = furthestShort(findings).slice(0, most)
  if (asked.length === 0) return { edits: [], left: [] }
  const waivers = [...ask.waivers, ...standing(findings, asked)]
  if (own === undefined) {
    const { edits, left } = repairPlan(evaluation, { waivers, locked, budget, onSpent })
    return { edits: shortened(evaluation, edits, waivers), left }
  }
  const others = evaluation.resolved.model.tokens.flatMap(({ id }) => (own.has(id) ? [] : [id]))
  const first = repairPlan(evaluation, {
    waivers,
    locked: new Set([...locked, ...others]),
    budget: Math.floor(budget * OWN_SHARE),
    onSpent,
  })
  if (first.left.length === 0) {
    return { edits: shortened(evaluation, first.edits, waivers), left: [] }
  }
  const second = repairPlan(withColors(evaluation, first.edits), {
    waivers,
    locked,
    budget: budget - first.evaluations,
    onSpent: (evaluations) => onSpent(first.evaluations + evaluations),
  })
  const edits = [...first.edits, ...second.edits]
  return { edits: shortened(evaluation, edits, waivers), left: second.left }
}

const isGatingBreach = ({ outcome, gating }: Finding) => outcome === 'breach' && gating

function furthestShort(findings: readonly Finding[]): Finding[] {
  return findings
    .filter(isGatingBreach)
    .toSorted((a, b) => a.ratio / a.required - b.ratio / b.required)
}

/** What is not to be mended stands as it is, as if a waiver allowed that much and no less. */
function standing(findings: readonly Finding[], asked: readonly Finding[]): WaiverModel[] {
  const isAsked = new Set(asked)
  return findings
    .filter((finding) => finding.outcome === 'known' || isGatingBreach(finding))
    .filter((finding) => !isAsked.has(finding))
    .map((finding) => ({
      id: '',
      foreground: finding.foreground,
      background: finding.background,
      kind: finding.kind,
      theme: finding.theme,
      foregroundState: finding.foregroundState,
      backgroundState: finding.backgroundState,
      floorRatio: finding.ratio,
      required: finding.required,
      endsAt: '9999-12-31T23:59:59.999Z',
    }))
}

/** The same edits with the fewest decimals that still pass, one after the other. */
function shortened(
  start: Evaluation,
  edits: readonly RepairEdit[],
  waivers: readonly WaiverModel[],
): RepairEdit[] {
  let evaluation = start
  return edits.map((edit) => {
    const probe = createColorProbe(evaluation, edit.place, { waivers })
    const trial = createProbeTrial(evaluation, probe, {
      isAsked: isGatingRow,
      acceptsWaivers: true,
    })
    const passing = SHORTEST_DECIMALS.map((decimals) => {
      const color = roundedColor(edit.color, decimals)
      const { cost, short, isBarred } = trial(color)
      return { ...edit, color, deltaEOk: cost, passes: short <= 0 && isBarred !== true }
    }).find(({ passes }) => passes)
    const { passes: _, ...short } = passing ?? { ...edit, passes: false }
    evaluation = withColors(evaluation, [short])
    return short
  })
}

function roundedColor({ l, c, h, alpha }: Oklch, decimals: number): Oklch {
  const rounded = (part: number | null, places: number) =>
    part === null ? null : Math.round(part * 10 ** places) / 10 ** places
  const hue = rounded(h, decimals - 2)
  const turned = hue === null ? null : hue % 360
  return { l: rounded(l, decimals), c: rounded(c, decimals), h: turned, alpha }
}
