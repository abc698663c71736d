import { type ModelGraph, stateAt } from './model-graph.ts'
import { type ModelFault, STATES } from './model.ts'
import { type ResolvedCell, STATE_COUNT } from './resolved.ts'
import { type LargestStep, largestStep } from './state-rule.ts'
import { computeValue, type ValuePass } from './value-computation.ts'
import { edgesOf, type ValuePlace } from './value-edges.ts'
import { planValue, type ValuePlan } from './value-plan.ts'

/** Aliases followed one after another, at most. */
const ALIAS_LIMIT = 32

const UNSEEN = 0
const OPEN = 1
const DONE = 2

/** A walk over the nodes: what is open is the path from a root to where it stands. */
interface Walk extends ValuePass {
  /** The rows of `cells` that this walk fills. */
  readonly rows: (ResolvedCell | undefined)[][]
  /** Nodes a token. */
  readonly width: number
  readonly progress: Uint8Array
  readonly plans: (ValuePlan | undefined)[]
  readonly largest: (LargestStep | undefined)[]
  readonly faults: ModelFault[]
  readonly reported: Set<string>
}

function placeOf(walk: Walk, node: number): ValuePlace {
  const { graph } = walk
  const row = Math.floor(node / STATE_COUNT)
  const themes = graph.parents.length
  const token = Math.floor(row / themes)
  const state = STATES[node % STATE_COUNT]!
  return { node, token, theme: row % themes, state, largest: walk.largest[token] }
}

/** Reports a cycle once, whatever the themes and states it appears in. */
function reportCycle(walk: Walk, stack: readonly number[], back: number): void {
  const { model } = walk.graph
  const open = stack.filter((node) => walk.progress[node] === OPEN)
  const places = [...open.slice(open.indexOf(back)), back].map((node) => placeOf(walk, node))
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

/** Opens a node: plans it and puts what it needs on the stack. */
function openNode(walk: Walk, stack: number[], place: ValuePlace): void {
  const { graph, progress } = walk
  const plan = planValue(graph, graph.model.tokens[place.token]!, place)
  walk.plans[place.node] = plan
  progress[place.node] = OPEN
  for (const needed of edgesOf(graph, plan, place)) {
    if (needed < 0 || progress[needed] === DONE) continue
    if (progress[needed] === OPEN) reportCycle(walk, stack, needed)
    else stack.push(needed)
  }
}

function walkFrom(walk: Walk, root: number): void {
  const stack = [root]
  while (stack.length > 0) {
    const node = stack.at(-1)!
    if (walk.progress[node] === UNSEEN) {
      openNode(walk, stack, placeOf(walk, node))
      continue
    }
    stack.pop()
    if (walk.progress[node] === DONE) continue
    const place = placeOf(walk, node)
    const cell = computeValue(walk, walk.plans[node]!, place)
    walk.progress[node] = DONE
    walk.plans[node] = undefined
    walk.rows[place.token]![node % walk.width] = cell
    if (cell !== undefined && cell.aliasDepth > ALIAS_LIMIT) reportDepth(walk, place)
  }
}

/** Nodes of a token in the order of themes and states. */
function nodesOf(graph: ModelGraph, token: number): number[] {
  const first = token * graph.parents.length * STATE_COUNT
  const offsets = [0, ...graph.states[token]!.map(stateAt)]
  return graph.parents.flatMap((_, theme) =>
    offsets.map((offset) => first + theme * STATE_COUNT + offset),
  )
}

function createWalk(graph: ModelGraph): Walk {
  const width = graph.parents.length * STATE_COUNT
  const tokens = graph.model.tokens.length
  const rows: (ResolvedCell | undefined)[][] = new Array(tokens)
  return {
    graph,
    cells: rows,
    rows,
    width,
    directions: new Map(),
    progress: new Uint8Array(tokens * width),
    plans: new Array(tokens * width),
    largest: new Array(tokens),
    faults: [],
    reported: new Set(),
  }
}

/**
 * Computes the values of some tokens in one topological pass, without recursion.
 * @param known cells by token position, for the tokens that are not computed; left untouched
 */
export function passValues(
  graph: ModelGraph,
  tokens: readonly number[],
  known: readonly (readonly ResolvedCell[] | undefined)[],
): {
  readonly cells: readonly (readonly (ResolvedCell | undefined)[])[]
  readonly faults: readonly ModelFault[]
} {
  const walk = createWalk(graph)
  for (const [token, cells] of known.entries()) {
    if (cells === undefined) continue
    walk.cells[token] = cells
    walk.progress.fill(DONE, token * walk.width, (token + 1) * walk.width)
  }
  for (const token of tokens) {
    const model = graph.model.tokens[token]!
    walk.rows[token] = new Array(walk.width).fill(undefined)
    walk.largest[token] = largestStep(graph.states[token]!, (state) =>
      graph.rules.stateRuleOf(model, state),
    )
  }
  for (const token of tokens) {
    for (const node of nodesOf(graph, token)) {
      if (walk.progress[node] === UNSEEN) walkFrom(walk, node)
    }
  }
  return { cells: walk.cells, faults: walk.faults }
}
