import { useMemo } from 'react'
import type { ModelNames } from '#console/lib/finding-words.ts'
import type { TriedEffect } from '#console/features/checks/tried-effect.ts'
import { measuredLines } from '#console/features/pairs/measured-lines.ts'
import { MeasuredList } from '#console/features/pairs/measured-list.tsx'
import { findingsByPair } from '#console/features/pairs/pair-outcomes.ts'
import { lowestFinding } from '#console/lib/lowest-finding.ts'
import { RatioColumns } from '#console/ui/ratio-text.tsx'

/** What a pair that is not declared yet would measure, its lowest first in a sentence, then all of it. */
export function WouldMeasure({
  id,
  tried,
  names,
}: {
  id: string
  tried: TriedEffect
  names: ModelNames
}) {
  const evaluation = tried.kind === 'measured' ? tried.evaluation : undefined
  const findings = useMemo(
    () => evaluation && (findingsByPair(evaluation).get(id) ?? []),
    [evaluation, id],
  )
  if (evaluation === undefined || findings === undefined) return null
  const lowest = lowestFinding(findings)
  return (
    <section className="pt-22">
      <h2 className="text-16 font-semibold">What it would measure</h2>
      {lowest !== undefined && (
        <p role="status" className="mt-4 flex flex-wrap items-baseline gap-x-6">
          Lowest in {names.theme(lowest.theme)}: <RatioColumns {...lowest} />
        </p>
      )}
      <MeasuredList
        lines={measuredLines(findings, evaluation.resolved.model.themes)}
        themeOf={names.theme}
      />
    </section>
  )
}
