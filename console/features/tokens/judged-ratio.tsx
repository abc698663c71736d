import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { type Measured, RatioMove } from '#console/ui/ratio-text.tsx'
import { passesByGroup } from '#console/lib/lowest-finding.ts'

/** A ratio, before and after where something is tried, with its mark; under it, that its group passes in its place. */
export function JudgedRatio({ before, ...measured }: Measured & { before: number | undefined }) {
  const { outcome } = measured
  return (
    <span className="ml-auto flex flex-col items-end">
      <span className="flex flex-wrap items-baseline justify-end gap-x-16">
        {outcome === 'breach' && <OutcomeMark kind="breach">breach</OutcomeMark>}
        {outcome === 'exempt' && <OutcomeMark kind="exempt">exempt</OutcomeMark>}
        <RatioMove before={before} {...measured} />
      </span>
      {passesByGroup(measured) && (
        <span className="pr-7 text-13 text-ink-soft">its group passes</span>
      )}
    </span>
  )
}
