import type * as z from 'zod'
import type { Finding, Verdict } from '#shared/checks/model.ts'
import type { effectSchema } from '#shared/contracts/findings.ts'
import { presentFinding } from '#shared/contracts/present-finding.ts'
import type { Head } from './heads.service.ts'

export type Effect = z.output<typeof effectSchema>

interface Move {
  readonly before: Head
  readonly after: Head
  /** Of both heads, at least the findings that are not `pass`. */
  readonly verdicts: { readonly before: Verdict; readonly after: Verdict }
}

/** Tells how a write moved the verdict: breaches that were not there before, and those that no longer are. */
export function effectOf({ before, after, verdicts }: Move): Effect {
  const [was, is] = [breachesOf(verdicts.before), breachesOf(verdicts.after)]
  const opened = [...is.values()].filter(({ identity }) => !was.has(identity))
  const resolved = [...was.values()].filter(({ identity }) => !is.has(identity))
  return {
    revision: after.revision,
    verdict: verdicts.after.verdict,
    opened: opened.map((finding) => presentFinding(finding, after.index.names)),
    resolved: resolved.map((finding) => presentFinding(finding, before.index.names)),
  }
}

const breachesOf = ({ findings }: Verdict): Map<string, Finding> =>
  new Map(
    findings
      .filter(({ outcome }) => outcome === 'breach')
      .map((finding) => [finding.identity, finding]),
  )
