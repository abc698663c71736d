import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { FindingMove } from './breaches.rules.ts'

/** A branch of a repository, as a pipeline names it. */
export interface SourceBranch {
  readonly repository: string
  readonly branch: string
}

/** Where a check says that it comes from. */
export interface Source {
  readonly repository?: string | undefined
  readonly branch?: string | undefined
}

/** Some pipelines name a branch by its whole ref: it is the same branch. @see https://git-scm.com/docs/gitglossary */
const HEADS = /^refs\/heads\//

/** The branch that a check comes from; nothing where its source does not say all of it. */
export function branchIn(source: Source | undefined): SourceBranch | undefined {
  if (source?.repository === undefined || source.branch === undefined) return undefined
  return { repository: source.repository, branch: source.branch.replace(HEADS, '') }
}

/** Whether one of the patterns names the branch; `*` in either part stands for any characters, also none. */
export const isProtectedBranch = (
  patterns: readonly SourceBranch[],
  { repository, branch }: SourceBranch,
): boolean =>
  patterns.some((pattern) => fits(pattern.repository, repository) && fits(pattern.branch, branch))

/** Takes each part at the first place where it stands: as good as any other, and never goes back. */
function fits(pattern: string, text: string): boolean {
  const [start = '', ...parts] = pattern.split('*')
  const end = parts.pop()
  if (end === undefined) return text === pattern
  if (!text.startsWith(start) || !text.endsWith(end)) return false
  let from = start.length
  for (const part of parts) {
    const at = text.indexOf(part, from)
    if (at < 0) return false
    from = at + part.length
  }
  return from <= text.length - end.length
}

/** What falls short whoever allows it: also with leave, and also what `newOnly` lets pass as known. */
export const sightedIn = (findings: readonly Finding[]): Finding[] =>
  findings.flatMap((finding) => {
    const { outcome } = finding
    if (outcome === 'known') return { ...finding, outcome: 'breach' as const }
    return outcome === 'breach' || outcome === 'waived' ? finding : []
  })

export interface CheckedBranch {
  /** Falls short, each identity once. */
  readonly sighted: readonly Finding[]
  readonly evaluation: Evaluation
  readonly passes: boolean
}

/**
 * How the entries of a branch move with a check of it. What the check measured and found to hold is closed; what
 * it did not measure only by a check that passes, since a pipeline may measure its pairs in several.
 */
export function movesOfBranch(
  logged: readonly string[],
  { sighted, evaluation, passes }: CheckedBranch,
): FindingMove[] {
  const seen = new Set(sighted.map(({ identity }) => identity))
  const gone = logged.filter((identity) => !seen.has(identity))
  const holding = gone.length === 0 ? new Map<string, Finding>() : findingsOf(evaluation)
  return [
    ...sighted.map((finding) => ({ identity: finding.identity, after: finding })),
    ...gone.flatMap((identity) => {
      const after = holding.get(identity)
      if (after !== undefined) return { identity, after }
      return passes ? { identity } : []
    }),
  ]
}

const findingsOf = (evaluation: Evaluation) =>
  new Map(verdictOf(evaluation).findings.map((finding) => [finding.identity, finding]))
