import type { ColorPlace } from './color-place.ts'
import { placeValue } from './color-place.ts'
import { createColorProbe } from './color-probe.ts'
import type { Evaluation } from './evaluation.ts'
import type { Finding, WaiverModel } from './model.ts'
import { isGatingRow, NEAREST_BUDGET, nearestAt, type PlacedColor } from './nearest-at.ts'
import { recheck } from './recheck.ts'
import { placeKey, setPlaces } from './repair-places.ts'
import { type RequirementConflict, requirementConflict } from './requirement-conflict.ts'
import { verdictOf } from './verdict.ts'

/** What is asked of a search for a token's nearest passing colour. */
export interface NearestPassingOptions {
  /** Granted and in force; what they cover is no breach. */
  readonly waivers?: readonly WaiverModel[]
  /** Token ids that never move. */
  readonly locked?: ReadonlySet<string>
  /** Evaluations, at most. */
  readonly budget?: number
  /** Called after each search with the evaluations so far. */
  readonly onSpent?: (evaluations: number) => void
}

/** What came of a search. */
export interface NearestPassing {
  /**
   * `passing`: nothing gating breaches on it; `found`: the edits mend all that does; `none`: no colour of the hue
   * does, and the conflict says why; `locked`: it may not move and nothing beside it mends it.
   */
  readonly outcome: 'passing' | 'found' | 'none' | 'locked'
  /** One an affected place; several where themes need their own. */
  readonly edits: readonly PlacedColor[]
  /** Whose colour moves: the token's own, or the other side of its pairs. */
  readonly side?: 'own' | 'other'
  /** The gating breaches that hang on the token. */
  readonly breaches: readonly Finding[]
  readonly conflict?: RequirementConflict
  readonly evaluations: number
  /** Whether the budget ran out: what was found may not be the nearest, and what was not found may exist. */
  readonly isStopped: boolean
}

/** The search, with what it has spent so far. */
interface Run {
  readonly evaluation: Evaluation
  readonly waivers: readonly WaiverModel[]
  readonly locked: ReadonlySet<string>
  readonly onSpent: (evaluations: number) => void
  left: number
  spent: number
  isStopped: boolean
}

function gatingBreaches(evaluation: Evaluation, waivers: readonly WaiverModel[]): Finding[] {
  const { findings } = verdictOf(evaluation, { waivers, include: 'not-pass' })
  return findings.filter(({ outcome, gating }) => outcome === 'breach' && gating)
}

/** Identities of all findings that hang on any of some places. */
function reachOf(evaluation: Evaluation, places: readonly ColorPlace[]): Set<string> {
  return new Set(
    places.flatMap((place) =>
      createColorProbe(evaluation, place).rows.map(({ finding }) => finding.identity),
    ),
  )
}

/** The system with colours set, for the next place to be searched in. */
export function withColors(evaluation: Evaluation, edits: readonly PlacedColor[]): Evaluation {
  const base = evaluation.resolved.model.themes[0]!.id
  let result = evaluation
  for (const { place, color } of edits) {
    const { token } = result.resolved.tokens.get(place.token)!
    const put = placeValue(token, { ...place, base }, { kind: 'color', color })
    const checked = recheck(result, { tokens: { put: [put] } })
    if (!checked.ok) throw new TypeError('A color was tried that its theme cannot have')
    result = checked.evaluation
  }
  return result
}

/** Searches some places one after the other; the edits, where together they mend everything. */
function tryPlaces(
  run: Run,
  places: readonly ColorPlace[],
  breaches: readonly Finding[],
): PlacedColor[] | undefined {
  const edits: PlacedColor[] = []
  let evaluation = run.evaluation
  for (const place of places) {
    if (run.left <= 0) {
      run.isStopped = true
      return undefined
    }
    const { found, evaluations, isStopped } = nearestAt(evaluation, place, {
      waivers: run.waivers,
      // Half of what is left, so that ways further down the list get their turn.
      budget: Math.ceil(run.left / 2),
    })
    run.left -= evaluations
    run.spent += evaluations
    run.isStopped ||= isStopped
    run.onSpent(run.spent)
    if (found === undefined) return undefined
    edits.push(found)
    evaluation = withColors(evaluation, [found])
  }
  const still = new Set(gatingBreaches(evaluation, run.waivers).map(({ identity }) => identity))
  return breaches.some(({ identity }) => still.has(identity)) ? undefined : edits
}

/** Ways to mend a token by its own colour, cheapest first; each is a list of places. */
function ownWays(run: Run, token: string, breaches: readonly Finding[]): ColorPlace[][] {
  const { model } = run.evaluation.resolved
  const base = model.themes[0]!.id
  const themes = [...new Set(breaches.map(({ theme }) => theme))]
  const order = model.themes.map(({ id }) => id).filter((id) => themes.includes(id))
  // From the last theme to the base: a theme that has its own colour is no concern of its parent's any more.
  const overrides = order.reverse().map((theme): ColorPlace => ({ token, theme }))
  const source: ColorPlace = { token, theme: base }
  const states = setPlaces(run.evaluation, model.tokens.find(({ id }) => id === token)!).filter(
    ({ state = 'rest', theme }) => state !== 'rest' && themes.includes(theme),
  )
  const ways = [
    ...(overrides.length === 1 ? [overrides] : []),
    [source],
    ...(overrides.length > 1 ? [overrides] : []),
    [...overrides.filter(({ theme }) => theme !== base), source],
    // Where the source cannot move without breaching elsewhere, every other theme keeps or finds its own.
    [
      ...model.themes
        .slice(1)
        .map(({ id }) => ({ token, theme: id }))
        .reverse(),
      source,
    ],
    ...(states.length > 0 ? [states, [...states, ...overrides]] : []),
  ]
  const seen = new Set<string>()
  return ways.filter((way) => {
    const key = way.map(placeKey).join()
    const isNew = !seen.has(key)
    seen.add(key)
    return isNew
  })
}

/** Tokens on the other side of breaching pairs that may move. */
function otherSides(run: Run, token: string, breaches: readonly Finding[]): string[] {
  const sides = breaches.flatMap(({ foreground, background }) => [foreground, background])
  return [...new Set(sides)].filter((id) => id !== token && !run.locked.has(id))
}

/** Why no colour passes, in the first way that reaches every breach. */
function conflictOf(
  run: Run,
  ways: readonly (readonly ColorPlace[])[],
): RequirementConflict | undefined {
  for (const [place] of ways) {
    const probe = createColorProbe(run.evaluation, place!, { waivers: run.waivers })
    const { conflict, evaluations } = requirementConflict(run.evaluation, probe, {
      isAsked: isGatingRow,
      budget: run.left,
    })
    run.left -= evaluations
    run.spent += evaluations
    if (conflict !== undefined) return conflict
  }
  return undefined
}

/** The first of some ways that mends everything. */
function firstOf(
  run: Run,
  ways: readonly (readonly ColorPlace[])[],
  breaches: readonly Finding[],
): PlacedColor[] | undefined {
  for (const way of ways) {
    const edits = tryPlaces(run, way, breaches)
    if (edits !== undefined) return edits
  }
  return undefined
}

/** The token's own colour has half of the budget, the other sides the rest, and why it cannot what is left then. */
function search(run: Run, token: string, breaches: readonly Finding[]): Partial<NearestPassing> {
  const isLocked = run.locked.has(token)
  const ways = isLocked ? [] : ownWays(run, token, breaches)
  const reserve = Math.floor(run.left / 2)
  run.left -= reserve
  const own = firstOf(run, ways, breaches)
  run.left += reserve
  if (own !== undefined) return { outcome: 'found', edits: own, side: 'own' }
  const others = otherSides(run, token, breaches).flatMap((id) => ownWays(run, id, breaches))
  const edits = firstOf(run, others, breaches)
  const conflict = conflictOf(run, ways)
  const why = conflict === undefined ? {} : { conflict }
  if (edits !== undefined) return { outcome: 'found', edits, side: 'other', ...why }
  return { outcome: isLocked ? 'locked' : 'none', ...why }
}

/**
 * The least change of colour, hue and alpha kept, after which every gating finding that hangs on a token passes: an
 * override in the breaching theme, else its source, else an override a theme, else the other side of its pairs.
 * @param options.budget evaluations, default 8000; the result says where it stopped early
 * @throws TypeError when the system has no such token
 */
export function nearestPassing(
  evaluation: Evaluation,
  token: string,
  options: NearestPassingOptions = {},
): NearestPassing {
  const { waivers = [], locked = new Set(), budget = NEAREST_BUDGET, onSpent = () => {} } = options
  const model = evaluation.resolved.tokens.get(token)?.token
  if (model === undefined) throw new TypeError(`No token ${token}`)
  const count = { left: budget, spent: 0, isStopped: false }
  const run: Run = { evaluation, waivers, locked, onSpent, ...count }
  const reach = reachOf(evaluation, setPlaces(evaluation, model))
  const breaches = gatingBreaches(evaluation, waivers).filter(({ identity }) => reach.has(identity))
  const result =
    breaches.length === 0 ? { outcome: 'passing' as const } : search(run, token, breaches)
  return {
    outcome: 'none',
    edits: [],
    breaches,
    ...result,
    evaluations: run.spent,
    isStopped: run.isStopped,
  }
}
