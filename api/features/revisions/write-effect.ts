import type * as z from 'zod'
import type { Consequence } from '#shared/checks/consequences.ts'
import type { Finding } from '#shared/checks/model.ts'
import type { effectSchema } from '#shared/contracts/findings.ts'
import { presentFinding } from '#shared/contracts/present-finding.ts'
import { verdictIn } from './head-tally.rules.ts'
import type { Head } from './heads.service.ts'

export type Effect = z.output<typeof effectSchema>

interface Move {
  readonly before: Head
  readonly after: Head
  /** What the edits moved, furthest short first. */
  readonly moved: readonly Consequence[]
}

/** Tells how a write moved the verdict: breaches that were not there before, and those that no longer are. */
export function effectOf({ before, after, moved }: Move): Effect {
  const opened = moved.flatMap((move) =>
    isBreach(move.after) && !isBreach(move.before) ? [move.after] : [],
  )
  const resolved = moved.flatMap((move) =>
    isBreach(move.before) && !isBreach(move.after) ? [move.before] : [],
  )
  return {
    revision: after.revision,
    verdict: verdictIn(after.tally),
    opened: opened.map((finding) => presentFinding(finding, after.index.names)),
    resolved: resolved.map((finding) => presentFinding(finding, before.index.names)),
  }
}

const isBreach = (finding: Finding | undefined): finding is Finding => finding?.outcome === 'breach'
