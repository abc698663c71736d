import { consequences } from '#shared/checks/consequences.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding, WaiverModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { type FindingMove, fallsShort } from './breaches.rules.ts'

/** What moved between two states of the head and falls short on either side; costs only the difference. */
export function movesBetween(
  before: Evaluation,
  after: Evaluation,
  waivers: readonly WaiverModel[],
): FindingMove[] {
  return consequences(before, after, { waivers }).filter(
    (move) => fallsShort(move.before) || fallsShort(move.after),
  )
}

/** Everything that falls short now, and everything that the log holds open: a comparison of the whole. */
export function movesAgainstLog(
  loggedIdentities: readonly string[],
  after: Evaluation,
  waivers: readonly WaiverModel[],
): FindingMove[] {
  const now = new Map<string, Finding>()
  for (const finding of verdictOf(after, { waivers }).findings) now.set(finding.identity, finding)
  const short = [...now.values()].filter(fallsShort)
  const gone = loggedIdentities.filter((identity) => !fallsShort(now.get(identity)))
  return [
    ...short.map((finding) => ({ identity: finding.identity, after: finding })),
    ...gone.map((identity) => {
      const finding = now.get(identity)
      return finding === undefined ? { identity } : { identity, after: finding }
    }),
  ]
}
