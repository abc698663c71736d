import { sameOklch } from './color-arithmetic.ts'
import { editFaults, modelFaults } from './model-faults.ts'
import { createModelGraph, type ModelGraph } from './model-graph.ts'
import type { DerivedState, ModelFault, PairModel, SystemModel } from './model.ts'
import {
  type ResolvedCell,
  type ResolvedSystem,
  type ResolvedToken,
  STATE_COUNT,
} from './resolved.ts'
import { spanFaults } from './theme-faults.ts'
import { lightOf } from './token-light.ts'
import { TokenRows } from './token-rows.ts'
import { namedTokens } from './value-edges.ts'
import { passValues } from './value-pass.ts'

/** A resolved model, or every reason why it cannot be resolved. */
export type Resolution =
  | { readonly ok: true; readonly resolved: ResolvedSystem }
  | { readonly ok: false; readonly faults: readonly ModelFault[] }

type Row = readonly (ResolvedCell | undefined)[]

/** Faults that leave no order in which themes could be computed. */
function barsThePass(fault: ModelFault): boolean {
  return fault.code === 'theme-cycle'
}

function spansOf(graph: ModelGraph, rows: readonly (Row | undefined)[]): ModelFault[] {
  return graph.model.themes.flatMap((theme, position) => {
    const ground = rows[graph.grounds[position]!]?.[position * STATE_COUNT]
    const ink = rows[graph.inks[position]!]?.[position * STATE_COUNT]
    return ground && ink ? spanFaults(theme, ground.color.rendered, ink.color.rendered) : []
  })
}

/** A row without gaps: what a token does not list holds rest's cell. */
function completeRow(row: Row): readonly ResolvedCell[] {
  return row.map((cell, offset) => cell ?? row[offset - (offset % STATE_COUNT)]!)
}

function toResolvedToken(graph: ModelGraph, position: number, row: Row): ResolvedToken {
  const cells = completeRow(row)
  return {
    token: graph.model.tokens[position]!,
    states: ['rest', ...graph.statesAt(position)],
    cells,
    light: lightOf(cells),
  }
}

/** A full pass computes every token, so none is asked for. */
function noKnownRow(token: number): never {
  throw new TypeError(`Token at ${token} is not computed`)
}

/**
 * Computes every token in every theme and state; a system without a theme yet has no value.
 * @returns the values with their provenance, or all faults of the model at once
 */
export function resolveSystem(model: SystemModel): Resolution {
  const graph = createModelGraph(model)
  const faults = modelFaults(graph)
  if (faults.some(barsThePass)) return { ok: false, faults }
  const all = model.tokens.map((_, position) => position)
  const pass = passValues(graph, all, noKnownRow)
  faults.push(...pass.faults, ...spansOf(graph, pass.rows))
  if (faults.length > 0) return { ok: false, faults }
  const { themeAt: themes, tokenAt: positions } = graph
  const rows = pass.rows.map((row, position) => toResolvedToken(graph, position, row!))
  const tokens = new TokenRows(positions, rows)
  return { ok: true, resolved: { model, themes, positions, tokens } }
}

/** By token id, the tokens whose values or rules name it. Ground and ink, which all depend on, are left out. */
export function dependentsOf(resolved: ResolvedSystem): Map<string, readonly string[]> {
  const graph = createModelGraph(resolved.model)
  const dependents = new Map<string, string[]>()
  for (const [position, token] of resolved.model.tokens.entries()) {
    for (const named of namedTokens(graph, token, position)) {
      const known = dependents.get(named)
      if (known) known.push(token.id)
      else dependents.set(named, [token.id])
    }
  }
  return dependents
}

/** Keeps the previous colour objects where a value came out the same, so that nothing is measured again for it. */
function keepSameColors(token: ResolvedToken, before: ResolvedToken): ResolvedToken {
  const cells = token.cells.map((cell, offset) => {
    const previous = before.cells[offset]!
    const isSame = sameOklch(cell.color.oklch, previous.color.oklch)
    return isSame ? { ...cell, color: previous.color } : cell
  })
  return { ...token, cells }
}

/** What a re-check computes again. */
export interface AgainTasks {
  /** Ids of all tokens whose value can have moved, removed ones too; no theme's ground or ink is among them. */
  readonly tokens: ReadonlySet<string>
  /** Pairs whose references can have gone. */
  readonly pairs: readonly PairModel[]
  /** Whether the model has the same tokens in the same order. */
  readonly hasSameTokens: boolean
}

/**
 * Computes some tokens again over a system that is resolved already; the rest is shared with it.
 * @returns undefined where the edited model has a fault, for the full pass to find them all
 */
export function resolveAgain(
  previous: ResolvedSystem,
  model: SystemModel,
  again: AgainTasks,
): ResolvedSystem | undefined {
  const knownAt = (position: number) => {
    const { id } = model.tokens[position]!
    return again.tokens.has(id) ? undefined : previous.tokens.get(id)
  }
  const graph = createModelGraph(model, {
    ...(again.hasSameTokens ? { tokenAt: previous.positions } : {}),
    statesAt: (position) => knownAt(position)?.states.slice(1) as DerivedState[] | undefined,
  })
  const positions = [...again.tokens]
    .map((id) => graph.tokenAt.get(id))
    .filter((position) => position !== undefined)
    .sort((a, b) => a - b)
  const touched = positions.map((position) => model.tokens[position]!)
  if (editFaults(graph, { tokens: touched, pairs: again.pairs }).length > 0) return undefined
  const pass = passValues(graph, positions, (position) => knownAt(position)!.cells)
  if (pass.faults.length > 0) return undefined
  const rows = again.hasSameTokens
    ? [...previous.tokens.rows]
    : model.tokens.map(({ id }) => previous.tokens.get(id)!) // What is new is filled in below.
  for (const [at, position] of positions.entries()) {
    const resolved = toResolvedToken(graph, position, pass.rows[position]!)
    const before = previous.tokens.get(touched[at]!.id)
    rows[position] = before ? keepSameColors(resolved, before) : resolved
  }
  const tokens = new TokenRows(graph.tokenAt, rows)
  return { model, themes: graph.themeAt, positions: graph.tokenAt, tokens }
}
