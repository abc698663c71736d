import { type Entry, toFinding, visitEntries } from './entries.ts'
import type { Evaluation } from './evaluation.ts'
import { createJudge, type JudgementOptions } from './judgement.ts'
import { reachOfRow } from './measured-row.ts'
import type { Finding, Outcome, SourceValue } from './model.ts'

/** How a token stands in one look; a breach on it is one with the token as background. */
export type StandingMark = 'breach' | 'breach-on-it' | 'waived' | 'exempt'

/** A token among its pairs. */
export interface TokenStanding {
  /** Pairs that declare it as foreground or background. */
  readonly pairs: number
  /** Further pairs, of tokens that follow it by alias or derivation. */
  readonly aliased: number
  readonly breaches: number
  readonly waived: number
  readonly mark: StandingMark | null
  /**
   * The finding furthest short of what it must reach; left out are exempt ones and those that another member of
   * their group stands in for. Absent where none requires anything.
   */
  readonly lowest?: Finding
}

/** How a finding hangs on a token: by one of the pair's own parts, or through a token that follows it. */
export type TokenPart = 'foreground' | 'background' | 'backdrop' | 'alias'

/** A finding that a token has a part in. */
export interface TokenFinding {
  readonly finding: Finding
  readonly as: TokenPart
}

/** By token id: the tokens that its values follow, in any theme that the system has. */
function followedTokens(evaluation: Evaluation): Map<string, ReadonlySet<string>> {
  const { themes, tokens } = evaluation.resolved.model
  const follows = new Map<string, ReadonlySet<string>>()
  const targetOf = (value: SourceValue | undefined) =>
    value === undefined || value.kind === 'color' ? [] : [value.token]
  for (const token of tokens) {
    const values = themes.flatMap(({ id }) => Object.values(token.values[id] ?? {}))
    const targets = new Set([token.value, ...values].flatMap(targetOf))
    if (targets.size > 0) follows.set(token.id, targets)
  }
  return follows
}

/** Everything reached over edges, the start left out. */
function reachable(
  start: string,
  edges: ReadonlyMap<string, ReadonlySet<string> | readonly string[]>,
): Set<string> {
  const reached = new Set(edges.get(start))
  for (const id of reached) {
    for (const next of edges.get(id) ?? []) reached.add(next)
  }
  reached.delete(start)
  return reached
}

/** By token id: positions of pairs whose foreground or background is it. */
function declaredPairs(evaluation: Evaluation): Map<string, Set<number>> {
  const declared = new Map<string, Set<number>>()
  for (const [position, { pair }] of evaluation.measures.entries()) {
    for (const id of [pair.foreground, pair.background]) {
      const known = declared.get(id)
      if (known) known.add(position)
      else declared.set(id, new Set([position]))
    }
  }
  return declared
}

/** By token id: positions of pairs of the tokens that follow it. */
function pairsThroughAliases(
  evaluation: Evaluation,
  declared: ReadonlyMap<string, ReadonlySet<number>>,
): Map<string, Set<number>> {
  const follows = followedTokens(evaluation)
  const through = new Map<string, Set<number>>()
  for (const [follower, pairs] of declared) {
    for (const target of reachable(follower, follows)) {
      const known = through.get(target) ?? new Set()
      for (const position of pairs) known.add(position)
      through.set(target, known)
    }
  }
  return through
}

interface Draft {
  breaches: number
  waived: number
  marks: Set<StandingMark>
  lowest: Entry | undefined
  reach: number
}

function markOf(outcome: Outcome, isForeground: boolean): StandingMark | undefined {
  if (outcome === 'breach' || outcome === 'known') return isForeground ? 'breach' : 'breach-on-it'
  return outcome === 'pass' ? undefined : outcome
}

function addEntry(draft: Draft, entry: Entry, aim: { isForeground: boolean; reach: number }): void {
  const { outcome, reason } = entry.judgement
  const mark = markOf(outcome, aim.isForeground)
  if (mark !== undefined) draft.marks.add(mark)
  if (outcome === 'breach') draft.breaches++
  if (outcome === 'waived') draft.waived++
  if (outcome !== 'exempt' && reason !== 'any-of' && aim.reach < draft.reach) {
    draft.lowest = entry
    draft.reach = aim.reach
  }
}

function draftStandings(evaluation: Evaluation, options: JudgementOptions): Map<string, Draft> {
  const drafts = new Map<string, Draft>()
  for (const { id } of evaluation.resolved.model.tokens) {
    const reach = Number.POSITIVE_INFINITY
    drafts.set(id, { breaches: 0, waived: 0, marks: new Set(), lowest: undefined, reach })
  }
  const judge = createJudge(evaluation, options)
  for (const subject of evaluation.subjects) {
    const { foreground, background } = subject
    visitEntries(evaluation, subject, judge, (measure, row, judgement, merged) => {
      const entry = merged ?? { measure, row, judgement, declared: [measure] }
      const reach = reachOfRow(evaluation, measure, row)
      addEntry(drafts.get(foreground)!, entry, { isForeground: true, reach })
      if (background !== foreground) {
        addEntry(drafts.get(background)!, entry, { isForeground: false, reach })
      }
    })
  }
  return drafts
}

const MARKS: readonly StandingMark[] = ['breach', 'breach-on-it', 'waived', 'exempt']

/** How every token stands among its pairs, by token id, in one pass over the evaluation. */
export function standingOf(
  evaluation: Evaluation,
  options: JudgementOptions = {},
): Map<string, TokenStanding> {
  const declared = declaredPairs(evaluation)
  const through = pairsThroughAliases(evaluation, declared)
  const standings = new Map<string, TokenStanding>()
  for (const [id, draft] of draftStandings(evaluation, options)) {
    const own = declared.get(id) ?? new Set()
    const further = [...(through.get(id) ?? [])].filter((position) => !own.has(position))
    standings.set(id, {
      pairs: own.size,
      aliased: further.length,
      breaches: draft.breaches,
      waived: draft.waived,
      mark: MARKS.find((mark) => draft.marks.has(mark)) ?? null,
      ...(draft.lowest ? { lowest: toFinding(evaluation, draft.lowest) } : {}),
    })
  }
  return standings
}

function partOf(token: string, entry: Entry): TokenPart {
  const { pair } = entry.measure
  if (pair.foreground === token) return 'foreground'
  if (pair.background === token) return 'background'
  const { backdrop } = pair
  return backdrop !== 'unknown' && backdrop.includes(token) ? 'backdrop' : 'alias'
}

/** Every finding that changes when a token does, by its own pairs and those of the tokens that depend on it. */
export function findingsOf(
  evaluation: Evaluation,
  token: string,
  options: JudgementOptions = {},
): TokenFinding[] {
  const dependents = reachable(token, evaluation.dependents)
  const positions = new Set(
    [token, ...dependents].flatMap((id) => evaluation.pairsOf.get(id) ?? []),
  )
  const judge = createJudge(evaluation, options)
  const found: TokenFinding[] = []
  for (const subject of evaluation.subjects) {
    if (!subject.members.some((position) => positions.has(position))) continue
    visitEntries(evaluation, subject, judge, (measure, row, judgement, merged) => {
      const entry = merged ?? { measure, row, judgement, declared: [measure] }
      found.push({ finding: toFinding(evaluation, entry), as: partOf(token, entry) })
    })
  }
  return found
}
