import { advisoriesOf } from './advisories.ts'
import { meetAnyOf } from './any-of.ts'
import { checkSystem, toPairsOf, toSubjects } from './check-system.ts'
import { applyEdits, type SystemEdits } from './edits.ts'
import type { Checked, Evaluation, PairMeasure } from './evaluation.ts'
import { measurePair } from './measure-pair.ts'
import type { Advisory, PairModel, SystemModel } from './model.ts'
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

/** Measures again what shows a token that moved, and what is declared anew; all else is shared. */
function measureAgain(
  previous: Evaluation,
  resolved: ResolvedSystem,
  moved: ReadonlySet<string>,
): readonly PairMeasure[] {
  const before = new Map<PairModel, PairMeasure>()
  const { pairs } = resolved.model
  const arePairsSame = pairs === previous.resolved.model.pairs
  if (arePairsSame) {
    if (moved.size === 0) return previous.measures
    const measures = [...previous.measures]
    for (const id of moved) {
      for (const position of previous.pairsOf.get(id) ?? []) {
        if (measures[position] !== previous.measures[position]) continue
        measures[position] = measurePair(resolved, pairs[position]!)
      }
    }
    return measures
  }
  for (const measure of previous.measures) before.set(measure.pair, measure)
  const showsMoved = (pair: PairModel) =>
    moved.has(pair.foreground) ||
    moved.has(pair.background) ||
    (pair.backdrop !== 'unknown' && pair.backdrop.some((id) => moved.has(id)))
  return pairs.map((pair) => {
    const known = before.get(pair)
    return known === undefined || showsMoved(pair) ? measurePair(resolved, pair) : known
  })
}

/** Groups whose members were measured again, declared or taken away. */
function anyOfAgain(
  previous: Evaluation,
  resolved: ResolvedSystem,
  measures: readonly PairMeasure[],
): ReadonlyMap<string, Uint8Array> {
  const before = new Set(previous.measures)
  const after = new Set(measures)
  const names = new Set<string>()
  for (const measure of [...previous.measures, ...measures]) {
    const { anyOf } = measure.pair
    if (anyOf !== undefined && !(before.has(measure) && after.has(measure))) names.add(anyOf)
  }
  if (names.size === 0) return previous.anyOf
  const groups = new Map(previous.anyOf)
  for (const name of names) groups.delete(name)
  for (const [name, met] of meetAnyOf(measures, resolved.model.themes.length, names)) {
    groups.set(name, met)
  }
  return groups
}

function advisoriesAgain(
  previous: Evaluation,
  resolved: ResolvedSystem,
  touched: ReadonlySet<string>,
): ReadonlyMap<string, readonly Advisory[]> {
  const advisories = new Map(previous.advisories)
  for (const id of touched) {
    advisories.delete(id)
    const token = resolved.tokens.get(id)
    const found = token === undefined ? [] : advisoriesOf(resolved, token)
    if (found.length > 0) advisories.set(id, found)
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

/**
 * Checks an edited system again: only what depends on the edits is computed and measured, the rest is shared
 * with the evaluation given, which stays as it was. Equal, finding by finding, to a full check of the edited model.
 */
export function recheck(previous: Evaluation, edits: SystemEdits): Checked {
  const before = previous.resolved
  const model = applyEdits(before.model, edits)
  if (touchesAll(edits)) return checkSystem(model)
  const touched = withDependents(previous, editedTokens(before.model, edits))
  for (const theme of model.themes) {
    if (touched.has(theme.ground) || touched.has(theme.ink)) return checkSystem(model)
  }
  const exposed = new Set(edits.pairs?.put)
  for (const id of edits.tokens?.remove ?? []) {
    for (const position of previous.pairsOf.get(id) ?? []) {
      const pair = before.model.pairs[position]!
      if (model.pairs.includes(pair)) exposed.add(pair)
    }
  }
  const resolved = resolveAgain(before, model, { tokens: touched, pairs: [...exposed] })
  if (resolved === undefined) return checkSystem(model)
  const moved = new Set(
    [...touched].filter((id) => !isSameToken(before.tokens.get(id), resolved.tokens.get(id))),
  )
  const arePairsSame = model.pairs === before.model.pairs
  const measures = measureAgain(previous, resolved, moved)
  return {
    ok: true,
    evaluation: {
      resolved,
      measures,
      subjects: arePairsSame ? previous.subjects : toSubjects(model.pairs),
      anyOf: anyOfAgain(previous, resolved, measures),
      advisories: advisoriesAgain(previous, resolved, touched),
      dependents: movesReferences(previous, edits) ? dependentsOf(resolved) : previous.dependents,
      pairsOf: arePairsSame ? previous.pairsOf : toPairsOf(model.pairs),
    },
  }
}
