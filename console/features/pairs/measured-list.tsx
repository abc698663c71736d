import { whereInWords } from '#console/lib/finding-words.ts'
import { passesByGroup } from '#console/lib/lowest-finding.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import type { MeasuredLine } from './measured-lines.ts'

/** What a pair measures now, in every theme and state. */
export function MeasuredList({
  lines,
  themeOf,
}: {
  lines: readonly MeasuredLine[]
  themeOf: (id: string) => string
}) {
  if (lines.length === 0) {
    return <p className="mt-8 text-ink-soft">Nothing measures it in any theme or state.</p>
  }
  return (
    <ul className="double-top mt-10">
      {lines.map(({ key, theme, states, finding }) => (
        <li
          key={key}
          className="flex min-h-38 flex-wrap items-center gap-x-16 gap-y-4 border-b border-feint py-4"
        >
          <PairSample {...finding.rendered} breaches={finding.outcome === 'breach'} />
          <span className="min-w-0 flex-1 basis-120">
            {whereInWords(themeOf(theme), states)}
            {finding.basis === 'p3' && <span className="text-ink-soft">, on Display P3</span>}
            {!finding.gating && <span className="text-ink-soft">, reported only</span>}
          </span>
          <span className="ml-auto flex flex-wrap items-baseline justify-end gap-x-16">
            <Mark finding={finding} />
            <RatioColumns {...finding} />
          </span>
        </li>
      ))}
    </ul>
  )
}

function Mark({ finding }: Pick<MeasuredLine, 'finding'>) {
  const { outcome } = finding
  if (outcome === 'breach' || outcome === 'known') {
    return <OutcomeMark kind="breach">breach</OutcomeMark>
  }
  if (outcome !== 'pass') {
    return (
      <OutcomeMark kind={outcome}>
        {outcome === 'exempt' && finding.reason !== undefined
          ? `${finding.reason} exempt`
          : outcome}
      </OutcomeMark>
    )
  }
  return passesByGroup(finding) ? (
    <span className="text-13 text-ink-soft">its group passes</span>
  ) : null
}
