import { isRoleUnset, type ModelGraph, stateAt } from './model-graph.ts'
import { type ModelFault, STATES } from './model.ts'
import { type ResolvedCell, STATE_COUNT } from './resolved.ts'
import { createSharedProvenance } from './shared-provenance.ts'
import { type LargestStep, largestStep } from './state-rule.ts'
import { computeValue, type ValuePass } from './value-computation.ts'
import { edgesOf, type ValuePlace } from './value-edges.ts'
import { planValue, type ValuePlan } from './value-plan.ts'

/** Aliases followed one after another, at most. */
export const ALIAS_LIMIT = 32

const UNSEEN = 0
const OPEN = 1
const DONE = 2

/** A walk over the nodes: what is open is the path from a root to where it stands. */
interface Walk extends ValuePass {
  readonly rows: ((ResolvedCell | undefined)[] | undefined)[]
  /** Nodes a token. */
  readonly width: number
  /** By token position: 1 + its place among those that are computed, 0 for any other. */
  readonly slots: Int32Array
  /** By slot and offset. */
  readonly progress: Uint8Array
  /** By slot. */
  readonly largest: (LargestStep | undefined)[]
  /** The path from a root to where the walk stands, and the plans of those of its nodes that are open. */
  readonly stack: number[]
  readonly plans: (ValuePlan | undefined)[]
  readonly faults: ModelFault[]
  readonly reported: Set<string>
}

function placeOf(walk: Walk, node: number): ValuePlace {
  const { graph } = walk
  const row = Math.floor(node / STATE_COUNT)
  const themes = graph.parents.length
  const token = Math.floor(row / themes)
  const state = STATES[node % STATE_COUNT]!
  return { node, token, theme: row % themes, state, largest: walk.largest[walk.slots[token]!] }
}

/** Where the progress of a node is kept; below 0 for one that is known already. */
function progressAt(walk: Walk, node: number): number {
  const offset = node % walk.width
  return (walk.slots[(node - offset) / walk.width]! - 1) * walk.width + offset
}

/** Reports a cycle once, whatever the themes and states it appears in. */
function reportCycle(walk: Walk, back: number): void {
  const { model } = walk.graph
  const open = walk.stack.filter((node) => walk.progress[progressAt(walk, node)] === OPEN)
  const places = [...open.slice(open.indexOf(back)), back].map((node) => placeOf(walk, node))
  // A theme that computes its ground from its ground has not set it: that is a fault of its own.
  if (places.some((place) => place.state === 'rest' && isRoleUnset(walk.graph, place))) return
  const names = places.map(({ token }) => model.tokens[token]!.name)
  const key = [...new Set(names)].sort().join('\n')
  if (walk.reported.has(key)) return
  walk.reported.add(key)
  const [first] = places
  const theme = model.themes[first!.theme]!
  walk.faults.push({
    code: 'reference-cycle',
    detail: `Values refer to each other in theme ${theme.key}: ${names.join(' → ')}`,
    token: model.tokens[first!.token]!.id,
    theme: theme.id,
    state: first!.state,
  })
}

function reportDepth(walk: Walk, place: ValuePlace): void {
  const { model } = walk.graph
  const token = model.tokens[place.token]!
  const key = `depth ${token.id}`
  if (walk.reported.has(key)) return
  walk.reported.add(key)
  walk.faults.push({
    code: 'alias-depth',
    detail: `${token.name} follows more than ${ALIAS_LIMIT} aliases, one after another`,
    token: token.id,
    theme: model.themes[place.theme]!.id,
    state: place.state,
  })
}

function push(walk: Walk, node: number): void {
  walk.stack.push(node)
  walk.plans.push(undefined)
}

/** Opens the node on top: plans it and puts what it needs above it. */
function openNode(walk: Walk, place: ValuePlace): void {
  const { graph, progress } = walk
  const plan = planValue(graph, graph.model.tokens[place.token]!, place)
  walk.plans[walk.plans.length - 1] = plan
  progress[progressAt(walk, place.node)] = OPEN
  for (const needed of edgesOf(graph, plan, place)) {
    if (needed < 0) continue
    const at = progressAt(walk, needed)
    if (at < 0 || progress[at] === DONE) continue
    if (progress[at] === OPEN) reportCycle(walk, needed)
    else push(walk, needed)
  }
}

/** Takes the node on top away: all that it needs is there. */
function closeNode(walk: Walk, place: ValuePlace): void {
  const plan = walk.plans.pop()!
  walk.stack.pop()
  const cell = computeValue(walk, plan, place)
  walk.progress[progressAt(walk, place.node)] = DONE
  walk.rows[place.token]![place.node % walk.width] = cell
  if (cell !== undefined && cell.aliasDepth > ALIAS_LIMIT) reportDepth(walk, place)
}

function walkFrom(walk: Walk, root: number): void {
  const { stack, plans, progress } = walk
  push(walk, root)
  while (stack.length > 0) {
    const node = stack.at(-1)!
    const done = progress[progressAt(walk, node)]
    if (done === DONE) {
      stack.pop()
      plans.pop()
    } else {
      const place = placeOf(walk, node)
      if (done === UNSEEN) openNode(walk, place)
      if (stack.at(-1) === node) closeNode(walk, place)
    }
  }
}

/** Nodes of a token in the order of themes and states. */
function nodesOf(graph: ModelGraph, token: number): number[] {
  const first = token * graph.parents.length * STATE_COUNT
  const offsets = [0, ...graph.statesAt(token).map(stateAt)]
  return graph.parents.flatMap((_, theme) =>
    offsets.map((offset) => first + theme * STATE_COUNT + offset),
  )
}

function createWalk(
  graph: ModelGraph,
  asked: readonly number[],
  knownRow: ValuePass['knownRow'],
): Walk {
  const width = graph.parents.length * STATE_COUNT
  const tokens = graph.model.tokens.length
  const slots = new Int32Array(tokens)
  for (const [at, token] of asked.entries()) slots[token] = at + 1
  return {
    graph,
    rows: new Array(tokens),
    knownRow,
    width,
    directions: new Map(),
    shared: createSharedProvenance(),
    slots,
    progress: new Uint8Array(asked.length * width),
    largest: new Array(asked.length + 1),
    stack: [],
    plans: [],
    faults: [],
    reported: new Set(),
  }
}

/**
 * Computes the values of some tokens in one topological pass, without recursion.
 * @param tokens positions
 * @param knownRow cells of any other token, read where one is needed
 * @returns rows by position, for the tokens asked for
 */
export function passValues(
  graph: ModelGraph,
  tokens: readonly number[],
  knownRow: ValuePass['knownRow'],
): { readonly rows: ValuePass['rows']; readonly faults: readonly ModelFault[] } {
  const walk = createWalk(graph, tokens, knownRow)
  for (const token of tokens) {
    const model = graph.model.tokens[token]!
    walk.rows[token] = new Array(walk.width).fill(undefined)
    walk.largest[walk.slots[token]!] = largestStep(graph.statesAt(token), (state) =>
      graph.rules.stateRuleOf(model, state),
    )
  }
  for (const token of tokens) {
    for (const node of nodesOf(graph, token)) {
      if (walk.progress[progressAt(walk, node)] === UNSEEN) walkFrom(walk, node)
    }
  }
  return { rows: walk.rows, faults: walk.faults }
}
