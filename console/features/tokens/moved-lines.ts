import type { Consequence } from '#shared/checks/consequences.ts'
import type { Finding } from '#shared/checks/model.ts'
import { passesByGroup } from '#console/lib/lowest-finding.ts'
import { type Relation, relationTo } from './relation-words.ts'

/** Findings that move alike, as one line. */
export interface MovedLine {
  readonly key: string
  readonly relation: Relation
  /** Theme id. */
  readonly theme: string
  readonly states: readonly string[]
  readonly before: number | undefined
  readonly ratio: number
  readonly required: number
  readonly outcome: Finding['outcome']
}

export interface MovedGroups {
  readonly breaching: readonly MovedLine[]
  readonly passing: readonly MovedLine[]
  /** Breaching before and after. */
  readonly stillBreaching: readonly MovedLine[]
  /** Passing before and after, nearest to the line first. */
  readonly stillPassing: readonly MovedLine[]
  readonly counts: {
    readonly breaching: number
    readonly passing: number
    readonly stillBreaching: number
    readonly stillPassing: number
    readonly exempt: number
  }
}

/** What a trial moves, in the order in which a person wants to know it. */
export function movedGroups(
  token: string,
  consequences: readonly Consequence[],
  follows: (id: string) => boolean,
): MovedGroups {
  const parts = {
    breaching: [] as Consequence[],
    passing: [] as Consequence[],
    stillBreaching: [] as Consequence[],
    stillPassing: [] as Consequence[],
    exempt: [] as Consequence[],
  }
  for (const consequence of consequences) parts[partOf(consequence)].push(consequence)
  const lines = (part: readonly Consequence[]) => joinedLines(token, part, follows)
  return {
    breaching: lines(parts.breaching),
    passing: lines(parts.passing),
    stillBreaching: lines(parts.stillBreaching),
    stillPassing: lines(parts.stillPassing),
    counts: {
      breaching: parts.breaching.length,
      passing: parts.passing.length,
      stillBreaching: parts.stillBreaching.length,
      stillPassing: parts.stillPassing.length,
      exempt: parts.exempt.length,
    },
  }
}

function partOf({ newly, after }: Consequence) {
  if (newly === 'breaching') return 'breaching'
  if (newly === 'passing') return 'passing'
  if (after === undefined || after.outcome === 'exempt') return 'exempt'
  return after.outcome === 'pass' ? 'stillPassing' : 'stillBreaching'
}

function joinedLines(
  token: string,
  consequences: readonly Consequence[],
  follows: (id: string) => boolean,
): MovedLine[] {
  const lines = new Map<string, MovedLine>()
  for (const { before, after } of consequences) {
    if (after === undefined) continue
    const relation = relationTo(token, after, follows)
    const key = [
      relation.word,
      relation.other,
      relation.through,
      after.theme,
      after.required,
      before?.ratio,
      after.ratio,
    ].join('/')
    const state = `${after.foregroundState}/${after.backgroundState}`
    const line = lines.get(key)
    lines.set(key, {
      key,
      relation,
      theme: after.theme,
      states: line === undefined ? [state] : [...line.states, state],
      before: before?.ratio,
      ratio: after.ratio,
      required: after.required,
      outcome: after.outcome,
    })
  }
  return [...lines.values()].sort((a, b) => margin(a) - margin(b))
}

function margin(line: MovedLine): number {
  return line.required === 0 || passesByGroup(line) ? Infinity : line.ratio / line.required
}
