import { useState } from 'react'
import { whereInWords } from '#console/lib/finding-words.ts'
import { WordButton } from '#console/ui/button.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'

type Finding = ImportWire['check']['findings'][number]

const FIRST_SHOWN = 6
/** What no one reads to its end need not be drawn to it. */
const MOST_LINES = 400

/** Findings whose verdict an import moves. */
export function FindingList({
  title,
  findings,
  isBefore = false,
}: {
  title: string
  findings: readonly Finding[]
  /** Whether they are as they were measured before it. */
  isBefore?: boolean
}) {
  const [isWhole, setWhole] = useState(false)
  if (findings.length === 0) return null
  const lines = joinedLines(findings)
  const shown = lines.slice(0, isWhole ? MOST_LINES : FIRST_SHOWN)
  return (
    <section className="mt-18">
      <h3 className="double-line pb-6 text-13 font-semibold">{title}</h3>
      <ul>
        {shown.map(({ finding, states }) => (
          <FindingLine
            key={finding.fingerprint}
            finding={finding}
            states={states}
            isBefore={isBefore}
          />
        ))}
      </ul>
      {!isWhole && shown.length < lines.length && (
        <WordButton className="mt-10" onClick={() => setWhole(true)}>
          {lines.length > MOST_LINES ? `The first ${MOST_LINES}` : 'All'} of {lines.length} lines
        </WordButton>
      )}
    </section>
  )
}

interface Line {
  readonly finding: Finding
  readonly states: readonly string[]
}

/** Furthest short first; states of a pair that measure the same stand in one line. */
function joinedLines(findings: readonly Finding[]): Line[] {
  const lines = new Map<string, Line>()
  for (const finding of findings) {
    const { foreground, background, theme, ratio, required } = finding
    const key = JSON.stringify([foreground, background, theme, ratio, required])
    const line = lines.get(key)
    lines.set(key, {
      finding: line?.finding ?? finding,
      states: [...(line?.states ?? []), finding.state],
    })
  }
  const margin = ({ finding: { ratio, required } }: Line) => ratio / required
  return [...lines.values()].sort((a, b) => margin(a) - margin(b))
}

function FindingLine({
  finding,
  states,
  isBefore,
}: {
  finding: Finding
  states: readonly string[]
  isBefore: boolean
}) {
  const { foreground, background, theme, gating, rendered } = finding
  return (
    <li className="flex min-h-38 flex-wrap items-center gap-x-16 gap-y-4 border-b border-feint py-4">
      <PairSample {...rendered} breaches={!isBefore} />
      <span className="min-w-0 flex-1 basis-200 break-words">
        <span className="font-medium">{foreground}</span> on {background}{' '}
        <span className="ml-4 text-13 text-ink-soft">
          {whereInWords(theme, states)}
          {!gating && ', reported only'}
        </span>
      </span>
      <span className="ml-auto flex flex-wrap items-baseline justify-end gap-x-16">
        {isBefore ? (
          <span className="text-13 text-ink-soft">was</span>
        ) : (
          <OutcomeMark kind="breach">breach</OutcomeMark>
        )}
        <RatioColumns {...finding} />
      </span>
    </li>
  )
}
