import { isRoleUnset, type ModelGraph, stateAt } from './model-graph.ts'
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
  readonly rows: ((ResolvedCell | undefined)[] | undefined)[]
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

/** Opens a node: plans it and puts what it needs on the stack. */
function openNode(walk: Walk, stack: number[], place: ValuePlace): void {
  const { graph, progress } = walk
  const plan = planValue(graph, graph.model.tokens[place.token]!, place)
  walk.plans[place.node] = plan
  progress[place.node] = OPEN
  for (const needed of edgesOf(graph, plan, place)) {
    if (needed < 0 || progress[needed] === DONE) continue
    if (walk.rows[Math.floor(needed / walk.width)] === undefined) continue // Known already.
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
  const offsets = [0, ...graph.statesAt(token).map(stateAt)]
  return graph.parents.flatMap((_, theme) =>
    offsets.map((offset) => first + theme * STATE_COUNT + offset),
  )
}

function createWalk(graph: ModelGraph, knownRow: ValuePass['knownRow']): Walk {
  const width = graph.parents.length * STATE_COUNT
  const tokens = graph.model.tokens.length
  return {
    graph,
    rows: new Array(tokens),
    knownRow,
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
 * @param tokens positions
 * @param knownRow cells of any other token, read where one is needed
 * @returns rows by position, for the tokens asked for
 */
export function passValues(
  graph: ModelGraph,
  tokens: readonly number[],
  knownRow: ValuePass['knownRow'],
): { readonly rows: ValuePass['rows']; readonly faults: readonly ModelFault[] } {
  const walk = createWalk(graph, knownRow)
  for (const token of tokens) {
    const model = graph.model.tokens[token]!
    walk.rows[token] = new Array(walk.width).fill(undefined)
    walk.largest[token] = largestStep(graph.statesAt(token), (state) =>
      graph.rules.stateRuleOf(model, state),
    )
  }
  for (const token of tokens) {
    for (const node of nodesOf(graph, token)) {
      if (walk.progress[node] === UNSEEN) walkFrom(walk, node)
    }
  }
  return { rows: walk.rows, faults: walk.faults }
}
