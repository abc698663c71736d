import { advisoriesOf } from './advisories.ts'
import { meetAnyOf } from './any-of.ts'
import { checkSystem, toPairsOf, toSubjects } from './check-system.ts'
import { applyEdits, type SystemEdits } from './edits.ts'
import type { Checked, Evaluation, PairMeasure } from './evaluation.ts'
import { measurePair } from './measure-pair.ts'
import type { PairModel, SystemModel } from './model.ts'
import { dependentsOf, resolveAgain } from './resolve-system.ts'
import type { ResolvedSystem, ResolvedToken } from './resolved.ts'
import { coversName } from './rule-scopes.ts'

/** Edits to what every value hangs on; they leave nothing to share. */
function touchesAll(edits: SystemEdits): boolean {
  return edits.themes !== undefined || edits.states !== undefined || edits.settings !== undefined
}

/** Tokens edited, removed, or under a prefix whose rules are edited. */
function editedTokens(model: SystemModel, edits: SystemEdits): Set<string> {
  const ids = new Set(edits.tokens?.remove)
  for (const token of edits.tokens?.put ?? []) ids.add(token.id)
  if (edits.prefixes !== undefined) {
    const before = new Set(model.prefixes)
    const after = new Set(edits.prefixes)
    const moved = [
      ...model.prefixes.filter((rules) => !after.has(rules)),
      ...edits.prefixes.filter((rules) => !before.has(rules)),
    ]
    for (const token of model.tokens) {
      if (moved.some((rules) => coversName(rules.prefix, token.name))) ids.add(token.id)
    }
  }
  return ids
}

/** The tokens edited, and all whose values follow from them. */
function withDependents(previous: Evaluation, edited: ReadonlySet<string>): Set<string> {
  const touched = new Set(edited)
  // A set is walked in order of insertion, so what is added is walked as well.
  for (const id of touched) {
    for (const dependent of previous.dependents.get(id) ?? []) touched.add(dependent)
  }
  return touched
}

function isSameToken(before: ResolvedToken | undefined, after: ResolvedToken | undefined): boolean {
  if (before === undefined || after === undefined) return false
  return (
    before.states.join() === after.states.join() &&
    before.cells.every((cell, offset) => cell.color === after.cells[offset]!.color)
  )
}

/** Measures in the order of pairs, and the names of `anyOf` groups in which one came or went. */
interface Remeasured {
  readonly measures: readonly PairMeasure[]
  readonly groups: ReadonlySet<string>
}

function noteGroup(groups: Set<string>, ...measures: readonly PairMeasure[]): void {
  for (const { pair } of measures) if (pair.anyOf !== undefined) groups.add(pair.anyOf)
}

/** Measures again what shows a token that moved, where the pairs are the same ones. */
function measureMoved(
  previous: Evaluation,
  resolved: ResolvedSystem,
  moved: readonly string[],
): Remeasured {
  const groups = new Set<string>()
  const positions = new Set(moved.flatMap((id) => previous.pairsOf.get(id) ?? []))
  if (positions.size === 0) return { measures: previous.measures, groups }
  const measures = [...previous.measures]
  for (const position of positions) {
    measures[position] = measurePair(resolved, resolved.model.pairs[position]!)
    noteGroup(groups, measures[position])
  }
  return { measures, groups }
}

/** Measures again what shows a token that moved, and what is declared anew. */
function measurePairs(
  previous: Evaluation,
  resolved: ResolvedSystem,
  moved: readonly string[],
): Remeasured {
  const groups = new Set<string>()
  const before = new Map<PairModel, PairMeasure>()
  for (const measure of previous.measures) before.set(measure.pair, measure)
  for (const position of moved.flatMap((id) => previous.pairsOf.get(id) ?? [])) {
    before.delete(previous.measures[position]!.pair)
  }
  const measures = resolved.model.pairs.map((pair) => {
    const known = before.get(pair)
    if (known !== undefined) return known
    const measure = measurePair(resolved, pair)
    noteGroup(groups, measure)
    return measure
  })
  const kept = new Set(measures)
  noteGroup(groups, ...previous.measures.filter((measure) => !kept.has(measure)))
  return { measures, groups }
}

/** Lays the groups in which a member was measured again, declared or taken away over the others. */
function anyOfAgain(
  previous: Evaluation,
  resolved: ResolvedSystem,
  { measures, groups }: Remeasured,
): Evaluation['anyOf'] {
  if (groups.size === 0) return previous.anyOf
  const anyOf = new Map(previous.anyOf)
  for (const name of groups) anyOf.delete(name)
  for (const [name, met] of meetAnyOf(measures, resolved.model.themes.length, groups)) {
    anyOf.set(name, met)
  }
  return anyOf
}

function advisoriesAgain(
  previous: Evaluation,
  resolved: ResolvedSystem,
  touched: ReadonlySet<string>,
): Evaluation['advisories'] {
  const before = previous.resolved.positions
  const advisories =
    resolved.positions === before
      ? [...previous.advisories]
      : resolved.tokens.rows.map(({ token: { id } }) => previous.advisories[before.get(id) ?? -1]!)
  for (const id of touched) {
    const token = resolved.tokens.get(id)
    if (token) advisories[resolved.positions.get(id)!] = advisoriesOf(resolved, token)
  }
  return advisories
}

/** Whether an edit can have changed which tokens name which. */
function movesReferences(previous: Evaluation, edits: SystemEdits): boolean {
  if (edits.prefixes !== undefined || edits.tokens?.remove?.length) return true
  const isPlain = (token: SystemModel['tokens'][number]) =>
    token.rules === undefined &&
    [token.value, ...Object.values(token.values).flatMap((values) => Object.values(values))].every(
      (value) => value === undefined || value.kind === 'color',
    )
  return (edits.tokens?.put ?? []).some((token) => {
    const before = previous.resolved.tokens.get(token.id)?.token
    return (
      before === undefined ||
      before.name !== token.name ||
      before.states.join() !== token.states.join() ||
      !isPlain(before) ||
      !isPlain(token)
    )
  })
}

function hasSameTokens(before: ResolvedSystem, edits: SystemEdits): boolean {
  const { put = [], remove = [] } = edits.tokens ?? {}
  return remove.length === 0 && put.every(({ id }) => before.tokens.has(id))
}

/** Pairs put by an edit, and pairs that are left though a token of theirs is removed. */
function exposedPairs(previous: Evaluation, model: SystemModel, edits: SystemEdits): PairModel[] {
  const removed = edits.tokens?.remove ?? []
  const left = removed
    .flatMap((id) => previous.pairsOf.get(id) ?? [])
    .map((position) => previous.measures[position]!.pair)
    .filter((pair) => model.pairs.includes(pair))
  return [...(edits.pairs?.put ?? []), ...left]
}

/**
 * Checks an edited system again: only what depends on the edits is computed and measured, the rest is shared
 * with the evaluation given, which stays as it was. Equal, finding by finding, to a full check of the edited model.
 */
export function recheck(previous: Evaluation, edits: SystemEdits): Checked {
  const before = previous.resolved
  const model = applyEdits(before.model, edits, before.positions)
  if (touchesAll(edits)) return checkSystem(model)
  const touched = withDependents(previous, editedTokens(before.model, edits))
  for (const theme of model.themes) {
    if (touched.has(theme.ground) || touched.has(theme.ink)) return checkSystem(model)
  }
  const resolved = resolveAgain(before, model, {
    tokens: touched,
    pairs: exposedPairs(previous, model, edits),
    hasSameTokens: hasSameTokens(before, edits),
  })
  if (resolved === undefined) return checkSystem(model)
  const moved = [...touched].filter(
    (id) => !isSameToken(before.tokens.get(id), resolved.tokens.get(id)),
  )
  const arePairsSame = model.pairs === before.model.pairs
  const measured = (arePairsSame ? measureMoved : measurePairs)(previous, resolved, moved)
  return {
    ok: true,
    evaluation: {
      resolved,
      measures: measured.measures,
      ...(arePairsSame
        ? { subjects: previous.subjects, subjectOf: previous.subjectOf }
        : toSubjects(model.pairs)),
      anyOf: anyOfAgain(previous, resolved, measured),
      advisories: advisoriesAgain(previous, resolved, touched),
      dependents: movesReferences(previous, edits) ? dependentsOf(resolved) : previous.dependents,
      pairsOf: arePairsSame ? previous.pairsOf : toPairsOf(model.pairs),
    },
  }
}
