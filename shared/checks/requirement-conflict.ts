import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { maxChroma } from '#shared/color/max-chroma.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { type ColorProbe, PROBED_BREACH } from './color-probe.ts'
import type { Evaluation } from './evaluation.ts'
import type { ProbedFinding, ProbeRow } from './probe-rows.ts'
import { createProbeTrial } from './probe-trial.ts'
import { smallestDisjoint } from './smallest-disjoint.ts'

/** From one lightness to another, both passing; OKLCH, 0 to 1, in steps of 0.005. */
export interface LightnessInterval {
  readonly from: number
  readonly to: number
}

/** One thing asked of a colour that stands against another. */
export interface ConflictingRequirement {
  /** What asks: a finding; a theme's ground and ink; or a distinct set that may not get worse. */
  readonly asks: 'finding' | 'theme-span' | 'distinct-set'
  readonly finding?: ProbedFinding
  /** Where it is met, at the present chroma and hue; empty where it is met nowhere. */
  readonly lightness: readonly LightnessInterval[]
}

/** The fewest requirements that no colour of the hue meets together. */
export interface RequirementConflict {
  readonly requirements: readonly ConflictingRequirement[]
  /** Of two with the colour between: the ratios multiplied, and what the other two sides have to each other. */
  readonly bound?: { readonly needed: number; readonly available: number }
}

const LIGHTNESS_STEPS = 200
const CHROMA_STEPS = 6

/** Colours that stand for all: every lightness at the present chroma first, then at others. */
function sampledColors(present: Oklch): Oklch[] {
  const lightness = Array.from({ length: LIGHTNESS_STEPS + 1 }, (_, at) => at / LIGHTNESS_STEPS)
  const at = (c: number | null) => lightness.map((l) => ({ ...present, l, c }))
  const hue = present.h ?? 0
  if (!((present.c ?? 0) > 0)) return at(present.c)
  const widest = Math.max(...lightness.map((l) => maxChroma(l, hue, 'p3')))
  const others = Array.from({ length: CHROMA_STEPS }, (_, step) => (step / CHROMA_STEPS) * widest)
  return [at(present.c), ...others.map(at)].flat()
}

interface Sampled {
  readonly row?: ProbeRow
  readonly asks: ConflictingRequirement['asks']
  /** By sample, 1 where it is met. */
  readonly met: Uint8Array
}

/** Tries every sample, and notes for each requirement where it is met. */
function sampleRequirements(
  before: Evaluation,
  task: {
    readonly probe: ColorProbe
    readonly colors: readonly Oklch[]
    readonly isAsked: (row: ProbeRow) => boolean
  },
): Sampled[] {
  const { probe, colors, isAsked } = task
  const column = () => new Uint8Array(colors.length)
  const asked = [...probe.rows.entries()]
    .filter(([, row]) => row.threshold > 0 && isAsked(row))
    .map(([at, row]) => ({ at, row, asks: 'finding' as const, met: column() }))
  const span: Sampled = { asks: 'theme-span', met: column() }
  const distinct: Sampled = { asks: 'distinct-set', met: column() }
  const hasSets = (before.resolved.model.distinctSets ?? []).length > 0
  const trial = createProbeTrial(before, probe, { isAsked: () => false, acceptsWaivers: true })
  for (const [sample, color] of colors.entries()) {
    const isReadable = probe.set(color).length === 0
    span.met[sample] = isReadable ? 1 : 0
    // An unreadable system measures nothing: only its span says no.
    for (const { at, met } of asked) {
      met[sample] = isReadable && probe.outcomes[at] === PROBED_BREACH ? 0 : 1
    }
    distinct.met[sample] = isReadable && hasSets && trial(color).isBarred === true ? 0 : 1
  }
  return [...asked, span, distinct].filter(({ met }) => met.includes(0))
}

function intervalsOf(met: Uint8Array): LightnessInterval[] {
  const intervals: LightnessInterval[] = []
  let from = -1
  for (let at = 0; at <= LIGHTNESS_STEPS + 1; at++) {
    const isMet = at <= LIGHTNESS_STEPS && met[at] === 1
    if (isMet && from < 0) from = at
    if (isMet || from < 0) continue
    intervals.push({ from: from / LIGHTNESS_STEPS, to: (at - 1) / LIGHTNESS_STEPS })
    from = -1
  }
  return intervals
}

/** The luminance that a row measures the moving colour against; undefined where both sides move or one shows through. */
function otherLuminance(probe: ColorProbe, row: ProbeRow): number | undefined {
  // Of two that cannot hold together each holds somewhere, so both move.
  const { foreground, foregroundAt, background, backgroundAt } = row.sides!
  const { reaches } = probe.values
  const moves = {
    foreground: reaches(row.finding.foreground, foregroundAt),
    background: reaches(row.finding.background, backgroundAt),
  }
  if (moves.foreground === moves.background) return undefined
  const other = moves.foreground ? background[backgroundAt]! : foreground[foregroundAt]!
  const { r, g, b, a } = other.color.rendered
  return a === 255 ? relativeLuminance(r, g, b) : undefined
}

function boundOf(probe: ColorProbe, rows: readonly ProbeRow[]): RequirementConflict['bound'] {
  const [first, second] = rows
  if (rows.length !== 2 || first === undefined || second === undefined) return undefined
  const one = otherLuminance(probe, first)
  const other = otherLuminance(probe, second)
  if (one === undefined || other === undefined) return undefined
  const needed = first.threshold * second.threshold
  const available = contrastRatio(one, other)
  return needed > available ? { needed, available } : undefined
}

function conflictOf(probe: ColorProbe, members: readonly Sampled[]): RequirementConflict {
  const bound = boundOf(
    probe,
    members.flatMap(({ row }) => (row ? [row] : [])),
  )
  return {
    requirements: members.map(({ asks, row, met }) => ({
      asks,
      ...(row ? { finding: row.finding } : {}),
      lightness: intervalsOf(met),
    })),
    ...(bound ? { bound } : {}),
  }
}

/**
 * Why no colour of a place's hue passes: the fewest requirements that no sampled colour meets together (exactly so up
 * to three of them, beyond that none of those named could be left out).
 * @param budget evaluations; where the samples need more, there is no answer
 * @returns the conflict, none where a sample does pass; and the evaluations spent on it
 */
export function requirementConflict(
  before: Evaluation,
  probe: ColorProbe,
  asked: { readonly isAsked: (row: ProbeRow) => boolean; readonly budget: number },
): { readonly conflict?: RequirementConflict; readonly evaluations: number } {
  const { isAsked, budget } = asked
  const colors = sampledColors(probe.present)
  const evaluations = colors.length * probe.weight
  if (evaluations > budget) return { evaluations: 0 }
  const sampled = sampleRequirements(before, { probe, colors, isAsked })
  const chosen = smallestDisjoint(sampled.map(({ met }) => met))
  if (chosen === undefined) return { evaluations }
  return {
    conflict: conflictOf(
      probe,
      chosen.map((at) => sampled[at]!),
    ),
    evaluations,
  }
}
