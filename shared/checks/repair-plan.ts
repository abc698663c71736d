import { checkSystem } from './check-system.ts'
import type { ColorPlace } from './color-place.ts'
import { createColorProbe } from './color-probe.ts'
import type { Evaluation } from './evaluation.ts'
import { createKeptSearches, type KeptSearches } from './kept-searches.ts'
import type { Finding, SystemModel, Verdict, WaiverModel } from './model.ts'
import { isGatingRow, NEAREST_BUDGET, nearestAt, type PlacedColor } from './nearest-at.ts'
import { withColors } from './nearest-passing.ts'
import { placeKey, placesOf, sidesOf } from './repair-places.ts'
import { type RequirementConflict, requirementConflict } from './requirement-conflict.ts'
import { verdictOf } from './verdict.ts'

/** Evaluations that a plan may take, unless told otherwise. */
export const REPAIR_BUDGET = 60_000

/** What a plan is allowed. */
export interface RepairPlanOptions {
  /** Granted and in force; what they cover is left as it is. */
  readonly waivers?: readonly WaiverModel[]
  /** Token ids that never move. */
  readonly locked?: ReadonlySet<string>
  /** Evaluations, at most. */
  readonly budget?: number
  /** Called after each search with the evaluations so far. */
  readonly onSpent?: (evaluations: number) => void
}

/** One change of a plan. */
export interface RepairEdit extends PlacedColor {
  /** Identities of the breaches that it mends. */
  readonly mends: readonly string[]
}

/** A breach that a plan leaves, and why. */
export interface LeftBreach {
  readonly finding: Finding
  /** `locked`: no side of it may move; `conflict`: no colour of a hue meets all it must; `budget`: stopped early. */
  readonly reason: 'locked' | 'conflict' | 'budget'
  readonly conflict?: RequirementConflict
}

/** A few changes of colour after which nothing gating breaches but what is left, with the full check that says so. */
export interface RepairPlan {
  readonly edits: readonly RepairEdit[]
  readonly left: readonly LeftBreach[]
  /** Gating breaches before. */
  readonly breachesBefore: number
  /** Of a full check of the system with the edits made, waivers laid over it. */
  readonly after: Verdict
  readonly evaluations: number
  readonly isStopped: boolean
}

interface Run {
  readonly waivers: readonly WaiverModel[]
  readonly locked: ReadonlySet<string>
  readonly onSpent: (evaluations: number) => void
  readonly searches: KeptSearches
  evaluation: Evaluation
  left: number
  spent: number
  isStopped: boolean
}

function gatingBreaches(run: Run, evaluation = run.evaluation): Finding[] {
  const { findings } = verdictOf(evaluation, { waivers: run.waivers, include: 'not-pass' })
  return findings.filter(({ outcome, gating }) => outcome === 'breach' && gating)
}

/** A place to change, and the breaches that hang on it. */
interface Candidate {
  readonly place: ColorPlace
  readonly reaches: readonly string[]
  /** Place in the order of cheapness: an override comes before a source. */
  readonly rank: number
}

/** Places that can mend a breach, those that reach the most breaches first. */
function candidatesOf(run: Run, breaches: readonly Finding[]): Candidate[] {
  const ranked = new Map<string, { place: ColorPlace; rank: number }>()
  for (const finding of breaches) {
    for (const side of sidesOf(finding)) {
      for (const [rank, place] of placesOf(run.evaluation, side).entries()) {
        const key = placeKey(place)
        if (!run.locked.has(place.token) && !ranked.has(key)) ranked.set(key, { place, rank })
      }
    }
  }
  const wanted = new Set(breaches.map(({ identity }) => identity))
  return [...ranked.values()]
    .map(({ place, rank }) => {
      const { rows } = createColorProbe(run.evaluation, place)
      const reached = new Set(rows.map(({ finding }) => finding.identity))
      return { place, rank, reaches: [...wanted].filter((identity) => reached.has(identity)) }
    })
    .filter(({ reaches }) => reaches.length > 0)
    .sort((a, b) => b.reaches.length - a.reaches.length || a.rank - b.rank)
}

/** Searches one place; `asked` says which breaches have to go, what passes has to stay. */
function searchPlace(
  run: Run,
  place: ColorPlace,
  free: ReadonlySet<string>,
): PlacedColor | undefined {
  const known = free.size === 0 ? run.searches.find(place) : undefined
  if (known !== undefined) return known ?? undefined
  if (run.left <= 0) {
    run.isStopped = true
    return undefined
  }
  const search = nearestAt(run.evaluation, place, {
    waivers: run.waivers,
    budget: Math.min(run.left, NEAREST_BUDGET),
    isAsked: (row) => isGatingRow(row) && !free.has(row.finding.identity),
  })
  run.left -= search.evaluations
  run.spent += search.evaluations
  run.isStopped ||= search.isStopped
  run.onSpent(run.spent)
  if (free.size === 0 && !search.isStopped) run.searches.keep(place, search)
  return search.found
}

/** Of the places that mend equally many breaches, the one that costs least. */
function bestOf(run: Run, candidates: readonly Candidate[], failed: Set<string>) {
  let best: { readonly candidate: Candidate; readonly found: PlacedColor } | undefined
  for (const candidate of candidates) {
    const key = placeKey(candidate.place)
    if (failed.has(key)) continue
    if (best !== undefined && candidate.reaches.length < best.candidate.reaches.length) break
    const found = searchPlace(run, candidate.place, new Set())
    if (found === undefined) failed.add(key)
    else if (best === undefined || found.deltaEOk < best.found.deltaEOk) best = { candidate, found }
  }
  return best
}

/** A place that mends one breach though others on it stay as they are. */
function partOf(run: Run, breaches: readonly Finding[], candidates: readonly Candidate[]) {
  for (const finding of breaches) {
    for (const candidate of candidates) {
      if (!candidate.reaches.includes(finding.identity)) continue
      const others = candidate.reaches.filter((identity) => identity !== finding.identity)
      if (others.length === 0) continue // Tried whole already.
      const found = searchPlace(run, candidate.place, new Set(others))
      if (found !== undefined) return { candidate, found }
    }
  }
  return undefined
}

/** One step of a plan taken, where it makes fewer breaches of what there were and none new. */
function step(run: Run, edits: RepairEdit[], chosen: PlacedColor): boolean {
  const before = new Set(gatingBreaches(run).map(({ identity }) => identity))
  const evaluation = withColors(run.evaluation, [chosen])
  const after = new Set(gatingBreaches(run, evaluation).map(({ identity }) => identity))
  const isWorse = [...after].some((identity) => !before.has(identity))
  const mends = [...before].filter((identity) => !after.has(identity))
  if (isWorse || mends.length === 0) return false
  run.searches.forget(run.evaluation, chosen.place)
  run.evaluation = evaluation
  edits.push({ ...chosen, mends })
  return true
}

function collectEdits(run: Run): RepairEdit[] {
  const edits: RepairEdit[] = []
  const failed = new Set<string>()
  for (;;) {
    const breaches = gatingBreaches(run)
    if (breaches.length === 0 || run.left <= 0) return edits
    const candidates = candidatesOf(run, breaches)
    const best = bestOf(run, candidates, failed)
    if (best !== undefined) {
      if (!step(run, edits, best.found)) failed.add(placeKey(best.candidate.place))
      continue
    }
    const part = partOf(run, breaches, candidates)
    if (part === undefined || !step(run, edits, part.found)) return edits
    failed.clear()
  }
}

/** Leaves out every edit without which as little breaches: a later one may have made it needless. */
function withoutNeedless(run: Run, start: Evaluation, edits: readonly RepairEdit[]): RepairEdit[] {
  const identitiesOf = (evaluation: Evaluation) =>
    gatingBreaches(run, evaluation).map(({ identity }) => identity)
  const target = gatingBreaches(run).length
  let kept = edits
  for (const edit of edits) {
    const without = kept.filter((other) => other !== edit)
    if (identitiesOf(withColors(start, without)).length <= target) kept = without
  }
  let evaluation = start
  return kept.map((edit) => {
    const before = identitiesOf(evaluation)
    evaluation = withColors(evaluation, [edit])
    const after = new Set(identitiesOf(evaluation))
    return { ...edit, mends: before.filter((identity) => !after.has(identity)) }
  })
}

/** Why a place cannot mend what hangs on it, searched once a place; counted like any other evaluation. */
function createConflictSearch(run: Run) {
  const known = new Map<string, RequirementConflict | undefined>()
  return (place: ColorPlace): RequirementConflict | undefined => {
    const key = placeKey(place)
    if (known.has(key)) return known.get(key)
    if (run.left <= 0) {
      run.isStopped = true
      return undefined
    }
    const probe = createColorProbe(run.evaluation, place, { waivers: run.waivers })
    const { conflict, evaluations } = requirementConflict(run.evaluation, probe, {
      isAsked: isGatingRow,
      budget: run.left,
    })
    run.left -= evaluations
    run.spent += evaluations
    // None: the samples cost more than is left.
    run.isStopped ||= evaluations === 0
    run.onSpent(run.spent)
    known.set(key, conflict)
    return conflict
  }
}

function leftBreach(
  run: Run,
  finding: Finding,
  conflictAt: ReturnType<typeof createConflictSearch>,
): LeftBreach {
  const places = sidesOf(finding)
    .flatMap((side) => placesOf(run.evaluation, side))
    .filter(({ token }) => !run.locked.has(token))
  if (places.length === 0) return { finding, reason: 'locked' }
  const reaching = places.find((place) =>
    createColorProbe(run.evaluation, place).rows.some(
      (row) => row.finding.identity === finding.identity,
    ),
  )
  const conflict = reaching && conflictAt(reaching)
  if (conflict !== undefined) return { finding, reason: 'conflict', conflict }
  // The samples find what the search does; were they to find more, there would be no conflict to name.
  /* v8 ignore next -- @preserve */
  return { finding, reason: run.isStopped ? 'budget' : 'conflict' }
}

function modelWith(evaluation: Evaluation, edits: readonly PlacedColor[]): SystemModel {
  return withColors(evaluation, edits).resolved.model
}

/**
 * A few changes of colour after which nothing gating breaches, or as little as can be: at each step the place whose
 * nearest passing colour mends the most breaches, of several the cheapest. What comes out is checked in full.
 * @param options.budget evaluations, default 60,000; the plan says where it stopped early
 */
export function repairPlan(evaluation: Evaluation, options: RepairPlanOptions = {}): RepairPlan {
  const { waivers = [], locked = new Set(), budget = REPAIR_BUDGET, onSpent = () => {} } = options
  const searches = createKeptSearches()
  const count = { left: budget, spent: 0, isStopped: false }
  const run: Run = { waivers, locked, onSpent, searches, evaluation, ...count }
  const breachesBefore = gatingBreaches(run).length
  const edits = withoutNeedless(run, evaluation, collectEdits(run))
  const checked = checkSystem(modelWith(evaluation, edits))
  // Each edit was read when it was made.
  /* v8 ignore next -- @preserve */
  if (!checked.ok) throw new TypeError('A plan makes a system that cannot be read')
  run.evaluation = checked.evaluation
  const after = verdictOf(checked.evaluation, { waivers, include: 'not-pass' })
  const conflictAt = createConflictSearch(run)
  return {
    edits,
    left: gatingBreaches(run).map((finding) => leftBreach(run, finding, conflictAt)),
    breachesBefore,
    after,
    evaluations: run.spent,
    isStopped: run.isStopped || run.left <= 0,
  }
}
