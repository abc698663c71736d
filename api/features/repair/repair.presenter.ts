import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { PlacedColor } from '#shared/checks/nearest-at.ts'
import type { NearestPassing } from '#shared/checks/nearest-passing.ts'
import type { RepairPlan } from '#shared/checks/repair-plan.ts'
import type { UsableToken } from '#shared/checks/usable-on.ts'
import type { RequirementConflict } from '#shared/checks/requirement-conflict.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { namesIn, presentFinding } from '#shared/contracts/present-finding.ts'
import type { CheckFindingWire } from '#shared/contracts/checks.contract.ts'
import type { listUsableOn, nearestPassing, planRepair } from '#shared/contracts/repair.contract.ts'
import type { AnswerOf } from '#shared/contracts/route.ts'
import type { ModelNames } from '#shared/contracts/wire-values.ts'
import { writeDtcgColor } from '#shared/formats/dtcg-color.ts'
import type { Mended } from './mend-findings.rules.ts'

type ConflictWire = NonNullable<AnswerOf<typeof nearestPassing>['conflict']>

function presentPlaced({ resolved }: Evaluation, placed: PlacedColor) {
  const names = namesIn(resolved)
  const { place, color, deltaEOk } = placed
  const { state = 'rest' } = place
  const { r, g, b, a } = renderColor(color)
  return {
    token: names.tokenName(place.token),
    theme: names.themeKey(place.theme),
    state,
    source: place.theme === resolved.model.themes[0]?.id && state === 'rest',
    color: writeDtcgColor(color),
    hex: formatHex(r, g, b, a),
    deltaEOk,
  }
}

function presentConflict(conflict: RequirementConflict, names: ModelNames): ConflictWire {
  return {
    requirements: conflict.requirements.map(({ asks, finding, lightness }) => ({
      asks,
      ...(finding === undefined
        ? {}
        : {
            foreground: names.tokenName(finding.foreground),
            background: names.tokenName(finding.background),
            theme: names.themeKey(finding.theme),
            state: `${finding.foregroundState}/${finding.backgroundState}`,
            required: finding.required,
            fingerprint: finding.identity,
          }),
      lightness: lightness.map(({ from, to }) => ({ from, to })),
    })),
    ...(conflict.bound ? { bound: { ...conflict.bound } } : {}),
  }
}

/** A search as its answer gives it: tokens and themes by name. */
export function presentNearest(
  evaluation: Evaluation,
  nearest: NearestPassing,
): AnswerOf<typeof nearestPassing> {
  const names = namesIn(evaluation.resolved)
  const { outcome, edits, side, breaches, conflict, evaluations, isStopped } = nearest
  return {
    outcome,
    edits: edits.map((edit) => presentPlaced(evaluation, edit)),
    ...(side === undefined ? {} : { side }),
    breaches: breaches.map((finding) => presentFinding(finding, names)),
    ...(conflict === undefined ? {} : { conflict: presentConflict(conflict, names) }),
    evaluations,
    stopped: isStopped,
  }
}

/** A plan as its answer gives it. */
export function presentPlan(evaluation: Evaluation, plan: RepairPlan): AnswerOf<typeof planRepair> {
  const names = namesIn(evaluation.resolved)
  const { edits, left, breachesBefore, after, evaluations, isStopped } = plan
  return {
    edits: edits.map((edit) => ({ ...presentPlaced(evaluation, edit), mends: [...edit.mends] })),
    left: left.map(({ finding, reason, conflict }) => ({
      finding: presentFinding(finding, names),
      reason,
      ...(conflict === undefined ? {} : { conflict: presentConflict(conflict, names) }),
    })),
    breachesBefore,
    after: { verdict: after.verdict, counts: after.counts },
    evaluations,
    stopped: isStopped,
  }
}

/** What a finding is told of its repair. */
export type Suggestion = Pick<CheckFindingWire, 'nearest' | 'unmended'>

/** Each mended or searched breach by its fingerprint. */
export function presentMended(
  evaluation: Evaluation,
  { edits, left }: Mended,
): ReadonlyMap<string, Suggestion> {
  const names = namesIn(evaluation.resolved)
  const unmended = left.map(({ finding, reason, conflict }): [string, Suggestion] => [
    finding.identity,
    {
      unmended: {
        reason,
        ...(conflict === undefined ? {} : { conflict: presentConflict(conflict, names) }),
      },
    },
  ])
  const mended = edits.flatMap((edit) => {
    const nearest = presentPlaced(evaluation, edit)
    return edit.mends.map((identity): [string, Suggestion] => [identity, { nearest }])
  })
  return new Map([...unmended, ...mended])
}

/** A token that may stand on another, by name. */
export function presentUsable(
  evaluation: Evaluation,
  { token, uses, lowest }: UsableToken,
): AnswerOf<typeof listUsableOn>['items'][number] {
  const names = namesIn(evaluation.resolved)
  const { theme, foregroundState, backgroundState, ratio } = lowest
  return {
    token: names.tokenName(token),
    uses: [...uses],
    lowest: {
      theme: names.themeKey(theme),
      state: `${foregroundState}/${backgroundState}`,
      ratio,
    },
  }
}
