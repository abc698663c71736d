import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import type { Checked, Evaluation } from '#shared/checks/evaluation.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { shadeCard } from '#shared/checks/shade-card.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { BenchResult } from './measure.ts'
import { medianMs } from './measure.ts'
import { naiveFindings, naiveLoop } from './naive-loop.ts'
import { FOCUS, seeded, systemOf } from './scenario.ts'

const SMALL = { tokens: 2_000, pairs: 5_000 }
const DOUBLE = { tokens: 4_000, pairs: 10_000 }
const LARGE = { tokens: 5_000, pairs: 10_000 }
/** As many tokens and pairs as a fifth of LARGE. */
const FIFTH = { tokens: 1_000, pairs: 2_000 }

export function evaluated(checked: Checked): Evaluation {
  if (checked.ok) return checked.evaluation
  throw new TypeError(checked.faults[0]?.detail)
}

const fullCheck = (model: SystemModel) =>
  verdictOf(evaluated(checkSystem(model)), { include: 'not-pass' })

/** A whole check against the loop that a user of a colour library would write over the same findings. */
export function* checkBench(): Generator<BenchResult> {
  const small = systemOf(SMALL)
  const full = medianMs(5, () => fullCheck(small))
  const findings = naiveFindings(evaluated(checkSystem(small)))
  const naive = medianMs(3, () => naiveLoop(findings))
  yield faster('check.full', full, naive, 20)
  const double = systemOf(DOUBLE)
  const doubled = medianMs(5, () => fullCheck(double))
  yield within('check.double', { value: doubled, baseline: full, unit: 'ms', most: 2.2 })
}

/** One token set anew, with what that moves: in a large system, and with as many dependents in a small one. */
export function* recheckBench(): Generator<BenchResult> {
  const large = evaluated(checkSystem(systemOf(LARGE)))
  const small = evaluated(checkSystem(systemOf(FIFTH)))
  const full = medianMs(3, () => fullCheck(large.resolved.model))
  const one = medianMs(60, tries(large))
  yield faster('recheck.one', one, full, full / 8, { target: '≤ 8 ms', met: one <= 8 })
  const inSmall = medianMs(60, tries(small))
  yield within('recheck.growth', { value: one, baseline: inSmall, unit: 'ms', most: 2 })
}

/** Sets the one token to a colour that differs at each call. */
function tries(evaluation: Evaluation): () => void {
  const random = seeded(11)
  return () => {
    const color = { l: random(), c: random() * 0.1, h: random() * 360, alpha: 1 }
    consequences(evaluation, tried(evaluation, color))
  }
}

/** The 21 × 13 shade card of a token with 60 findings, against re-checking the system for each of its chips. */
export function* shadeCardBench(): Generator<BenchResult> {
  const evaluation = evaluated(checkSystem(systemOf(SMALL)))
  const place = { token: FOCUS, theme: 'thm_light' }
  const card = medianMs(15, () => shadeCard(evaluation, place, { zoom: 'wide' }))
  const { chips } = shadeCard(evaluation, place, { zoom: 'wide' })
  const colors = chips.flat().flatMap((chip) => chip?.color ?? [])
  const one = medianMs(3, () => {
    for (const color of colors) verdictOf(tried(evaluation, color), { include: 'none' })
  })
  yield faster('shade-card', card, one, 1, { target: '≤ 30 ms', met: card <= 30 })
}

function tried(evaluation: Evaluation, color: Oklch): Evaluation {
  const focus = evaluation.resolved.model.tokens.find(({ id }) => id === FOCUS)!
  const put = [{ ...focus, value: { kind: 'color', color } as const }]
  return evaluated(recheck(evaluation, { tokens: { put } }))
}

function faster(
  name: string,
  value: number,
  baseline: number,
  times: number,
  said?: { readonly target: string; readonly met: boolean },
): BenchResult {
  const ratio = baseline / value
  const { target, met } = said ?? { target: `≥ ${times} × faster`, met: ratio >= times }
  return { name, value, unit: 'ms', baseline, ratio, target, met }
}

interface Within {
  readonly value: number
  readonly baseline: number
  readonly unit: string
  /** The greatest ratio of value to baseline. */
  readonly most: number
}

function within(name: string, { value, baseline, unit, most }: Within): BenchResult {
  const ratio = value / baseline
  return { name, value, unit, baseline, ratio, target: `≤ ${most} × as long`, met: ratio <= most }
}
