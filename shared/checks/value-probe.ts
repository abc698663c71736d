import type { Oklch } from '#shared/color/oklch.ts'
import { toResolvedColor } from './color-arithmetic.ts'
import type { ColorPlace } from './color-place.ts'
import { createModelGraph, type ModelGraph, stateAt } from './model-graph.ts'
import type { DerivedState, ModelFault } from './model.ts'
import { type ResolvedCell, type ResolvedSystem, STATE_COUNT } from './resolved.ts'
import { largestStep } from './state-rule.ts'
import { SPAN_RATIO, spanFaults, spanRatio } from './theme-faults.ts'
import { computeValue, type ValuePass } from './value-computation.ts'
import { edgesOf, type ValuePlace } from './value-edges.ts'
import { nodeAt, planValue, type ValuePlan } from './value-plan.ts'

/** One value that hangs on the probed one, and how it is computed. */
interface ReachedNode {
  readonly place: ValuePlace
  readonly plan: ValuePlan
}

/**
 * The values that hang on one place, computed again for one colour after another. What the plan of a value is
 * does not depend on colours, so it is laid once; every other value stays as it was resolved.
 */
export interface ValueProbe {
  /** Cells of a token as the last colour left them; the same array each time. */
  cellsOf(token: string): readonly ResolvedCell[]
  /** Whether a value can move: theme position and state position. */
  reaches(token: string, offset: number): boolean
  /** Ids of tokens with a value that can move. */
  readonly tokens: readonly string[]
  /** Values that one colour computes. */
  readonly count: number
  /** Sets the colour, computes what hangs on it, and answers the faults that it makes. */
  set(color: Oklch): readonly ModelFault[]
  /** How far ground and ink of a theme that can move lie too near: required over measured, at least 0. */
  spanShortage(): number
}

function graphOf(resolved: ResolvedSystem): ModelGraph {
  const { model } = resolved
  return createModelGraph(model, {
    tokenAt: resolved.positions,
    statesAt: (position) =>
      resolved.tokens.get(model.tokens[position]!.id)!.states.slice(1) as DerivedState[],
  })
}

/** Every value of some tokens with its plan and what it is computed from. */
function plannedNodes(graph: ModelGraph, tokens: readonly number[]): Map<number, ReachedNode> {
  const nodes = new Map<number, ReachedNode>()
  for (const token of tokens) {
    const model = graph.model.tokens[token]!
    const states = graph.statesAt(token)
    const largest = largestStep(states, (state) => graph.rules.stateRuleOf(model, state))
    for (const theme of graph.parents.keys()) {
      for (const state of ['rest', ...states] as const) {
        const node = nodeAt(graph, token, theme, state)
        const plan = planValue(graph, model, { theme, state })
        nodes.set(node, { plan, place: { node, token, theme, state, largest } })
      }
    }
  }
  return nodes
}

/** The nodes that hang on one, in an order in which each comes after all that it is computed from. */
function reachedFrom(
  graph: ModelGraph,
  root: number,
  nodes: ReadonlyMap<number, ReachedNode>,
): ReachedNode[] {
  const followers = new Map<number, number[]>()
  for (const [node, { plan, place }] of nodes) {
    for (const needed of new Set(edgesOf(graph, plan, place))) {
      const known = followers.get(needed)
      if (known) known.push(node)
      else followers.set(needed, [node])
    }
  }
  const reached = new Set([root])
  const waiting = new Map<number, number>()
  for (const node of reached) {
    for (const follower of followers.get(node) ?? []) {
      waiting.set(follower, (waiting.get(follower) ?? 0) + 1)
      reached.add(follower)
    }
  }
  const order = [root]
  for (const node of order) {
    for (const follower of followers.get(node) ?? []) {
      const left = waiting.get(follower)! - 1
      waiting.set(follower, left)
      if (left === 0) order.push(follower)
    }
  }
  return order.slice(1).map((node) => nodes.get(node)!)
}

/** Themes whose ground or ink can move, so that their span has to be looked at. */
function movedThemes(graph: ModelGraph, reached: ReadonlySet<number>): number[] {
  return [...graph.parents.keys()].filter((theme) =>
    [graph.grounds[theme]!, graph.inks[theme]!].some((token) =>
      reached.has(nodeAt(graph, token, theme, 'rest')),
    ),
  )
}

/**
 * Lays out everything that hangs on one place.
 * @param resolved in which a colour is set at that place, so that the plan is that of a colour
 * @param candidates ids of all tokens that can follow the place
 */
export function createValueProbe(
  resolved: ResolvedSystem,
  place: ColorPlace,
  candidates: Iterable<string>,
): ValueProbe {
  const graph = graphOf(resolved)
  const { model } = resolved
  const positions = [...candidates].map((id) => graph.tokenAt.get(id)!)
  const token = graph.tokenAt.get(place.token)!
  const theme = graph.themeAt.get(place.theme)!
  const root = nodeAt(graph, token, theme, place.state ?? 'rest')
  const nodes = plannedNodes(graph, positions)
  const order = reachedFrom(graph, root, nodes)
  const rows: ResolvedCell[][] = new Array(model.tokens.length)
  const knownRow = (position: number) => resolved.tokens.get(model.tokens[position]!.id)!.cells
  const reached = new Set([root, ...order.map((node) => node.place.node)])
  for (const at of new Set([token, ...order.map((node) => node.place.token)])) {
    rows[at] = [...knownRow(at)]
  }
  const pass: ValuePass = { graph, rows, knownRow, directions: new Map() }
  const offsetOf = (at: ValuePlace) => at.theme * STATE_COUNT + stateAt(at.state)
  const rootOffset = theme * STATE_COUNT + (root % STATE_COUNT)
  const spans = movedThemes(graph, reached)
  const cellsOf = (id: string) => {
    const at = graph.tokenAt.get(id)!
    return rows[at] ?? knownRow(at)
  }
  const spanOf = (at: number) => {
    const { ground, ink } = model.themes[at]!
    const renderedOf = (id: string) => cellsOf(id)[at * STATE_COUNT]!.color.rendered
    return { ground: renderedOf(ground), ink: renderedOf(ink) }
  }
  return {
    cellsOf,
    reaches: (id, offset) =>
      reached.has(graph.tokenAt.get(id)! * graph.parents.length * STATE_COUNT + offset),
    tokens: [...rows.keys()].filter((at) => rows[at]).map((at) => model.tokens[at]!.id),
    count: order.length + 1,
    set(color) {
      const resolvedColor = toResolvedColor(color)
      pass.directions.clear()
      rows[token]![rootOffset] = {
        color: resolvedColor,
        provenance: { from: rootOffset === 0 ? 'source' : 'override' },
        aliasDepth: 0,
      }
      for (const { plan, place: at } of order) {
        rows[at.token]![offsetOf(at)] = computeValue(pass, plan, at)!
      }
      return spans.flatMap((at) => {
        const { ground, ink } = spanOf(at)
        return spanFaults(model.themes[at]!, ground, ink)
      })
    },
    spanShortage: () =>
      Math.max(
        0,
        ...spans.map((at) => {
          const { ground, ink } = spanOf(at)
          return SPAN_RATIO / spanRatio(ground, ink)
        }),
      ),
  }
}
