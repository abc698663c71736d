import { ENGINE_STAMP } from './engine.ts'
import { visitEntries } from './entries.ts'
import type { Evaluation } from './evaluation.ts'
import { createFindingWriter } from './finding-writer.ts'
import { createJudge, type JudgementOptions } from './judgement.ts'
import { themeOfRow } from './measured-row.ts'
import type { Finding, Outcome, Verdict } from './model.ts'

/** How an evaluation is judged and how much of it is written out. */
export interface VerdictOptions extends JudgementOptions {
  /** Which findings are written out, default `all`; counts cover all of them either way. */
  readonly include?: 'all' | 'not-pass' | 'none'
}

/**
 * Judges what was measured: entries by identity with their outcome, counts, advisories, and `fail` where a
 * breach gates. Findings stand in the order of their pairs.
 */
export function verdictOf(evaluation: Evaluation, options: VerdictOptions = {}): Verdict {
  const counts: Record<Outcome, number> = { pass: 0, breach: 0, waived: 0, exempt: 0, known: 0 }
  const findings: Finding[] = []
  const { include = 'all' } = options
  const judge = createJudge(evaluation, options)
  const write = createFindingWriter(evaluation)
  let fails = false
  for (const subject of evaluation.subjects) {
    visitEntries(evaluation, subject, judge, (measure, row, judgement, entry) => {
      const { outcome } = judgement
      counts[outcome]++
      if (outcome === 'breach' && themeOfRow(evaluation, measure, row).gating) fails = true
      if (include === 'none' || (include === 'not-pass' && outcome === 'pass')) return
      findings.push(write(measure, row, judgement, entry?.declared))
    })
  }
  return {
    verdict: fails ? 'fail' : 'pass',
    counts,
    findings,
    advisories: evaluation.advisories.flat(),
    engine: ENGINE_STAMP,
  }
}

/** The breaches of a verdict by identity, as `known` for another verdict that is compared with it. */
export function breachRatios(verdict: Verdict): Map<string, number> {
  const ratios = new Map<string, number>()
  for (const finding of verdict.findings) {
    if (finding.outcome === 'breach') ratios.set(finding.identity, finding.ratio)
  }
  return ratios
}
