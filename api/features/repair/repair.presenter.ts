import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { PlacedColor } from '#shared/checks/nearest-at.ts'
import type { NearestPassing } from '#shared/checks/nearest-passing.ts'
import type { RepairPlan } from '#shared/checks/repair-plan.ts'
import type { RequirementConflict } from '#shared/checks/requirement-conflict.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { namesIn, presentFinding } from '#shared/contracts/present-finding.ts'
import type { nearestPassing, planRepair } from '#shared/contracts/repair.contract.ts'
import type { AnswerOf } from '#shared/contracts/route.ts'
import type { ModelNames } from '#shared/contracts/wire-values.ts'
import { writeDtcgColor } from '#shared/formats/dtcg-color.ts'

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
