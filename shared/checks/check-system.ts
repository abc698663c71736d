import { advisoriesOf } from './advisories.ts'
import { meetAnyOf } from './any-of.ts'
import type { Checked, Evaluation, PairMeasure, Subject } from './evaluation.ts'
import { createPairMeasuring } from './measure-pair.ts'
import type { PairModel, SystemModel } from './model.ts'
import { dependentsOf, resolveSystem } from './resolve-system.ts'
import type { ResolvedSystem } from './resolved.ts'
import { kindOf } from './uses.ts'

/** Gathers the pairs whose findings can share an identity, in the order of their first. */
export function toSubjects(
  pairs: readonly PairModel[],
): Pick<Evaluation, 'subjects' | 'subjectOf'> {
  type Draft = Subject & { readonly members: number[] }
  const subjects: Draft[] = []
  const subjectOf: number[] = []
  const known = new Map<string, number>()
  for (const [position, { foreground, background, use }] of pairs.entries()) {
    const kind = kindOf(use)
    const key = `${kind} ${foreground.length} ${foreground} ${background}`
    let at = known.get(key)
    if (at === undefined) {
      at = subjects.length
      known.set(key, at)
      subjects.push({ foreground, background, kind, members: [] })
    }
    subjects[at]!.members.push(position)
    subjectOf.push(at)
  }
  return { subjects, subjectOf }
}

/** By token id, the positions of the pairs that show it. */
export function toPairsOf(pairs: readonly PairModel[]): Map<string, readonly number[]> {
  const pairsOf = new Map<string, number[]>()
  for (const [position, pair] of pairs.entries()) {
    const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
    for (const token of new Set([pair.foreground, pair.background, ...backdrop])) {
      const known = pairsOf.get(token)
      if (known) known.push(position)
      else pairsOf.set(token, [position])
    }
  }
  return pairsOf
}

/** Measures every pair of a resolved system. */
export function evaluateSystem(resolved: ResolvedSystem): Evaluation {
  const { pairs, themes } = resolved.model
  const measures: readonly PairMeasure[] = pairs.map(createPairMeasuring(resolved))
  return {
    resolved,
    measures,
    ...toSubjects(pairs),
    anyOf: meetAnyOf(measures, themes.length),
    advisories: resolved.tokens.rows.map((token) => advisoriesOf(resolved, token)),
    dependents: dependentsOf(resolved),
    pairsOf: toPairsOf(pairs),
  }
}

/**
 * Resolves a model and measures every declared pair in every theme and state.
 * @returns the measurements, for `verdictOf` to judge; or all faults of the model at once
 */
export function checkSystem(model: SystemModel): Checked {
  const resolution = resolveSystem(model)
  if (!resolution.ok) return resolution
  return { ok: true, evaluation: evaluateSystem(resolution.resolved) }
}
