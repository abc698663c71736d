import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { passesByGroup } from '#console/lib/lowest-finding.ts'
import type { PairRowData } from './pair-filter.ts'
import { pairOutcome } from './pair-outcomes.ts'

/** What a pair comes to, with its word; nothing where it passes. */
export function PairMark({ row: { findings, lowest } }: { row: PairRowData }) {
  if (findings === undefined) return <span className="text-ink-soft">measuring</span>
  const outcome = pairOutcome(findings)
  if (outcome === undefined) return <span className="text-ink-soft">not measured</span>
  if (outcome !== 'pass') return <OutcomeMark kind={outcome}>{outcome}</OutcomeMark>
  return lowest !== undefined && passesByGroup(lowest) ? (
    <span className="text-13 text-ink-soft">its group passes</span>
  ) : null
}
