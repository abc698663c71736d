import { stateInWords } from '#shared/checks/finding-words.ts'
import type { ReactNode } from 'react'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { BreachAside, BreachLink, type BreachRowProps } from './breach-row.tsx'
import { outcomeOf } from './breach-words.ts'
import { BreachStatus } from './breach-status.tsx'

/** A breach on a narrow screen: two lines, and its history under them where it is opened. */
export function BreachLine({ under, ...row }: BreachRowProps & { under: ReactNode }) {
  const { breach, isOpened } = row
  return (
    <>
      <li data-opened={isOpened || undefined}>
        <div className="flex items-baseline justify-between gap-12 pt-4">
          <span className="min-w-0">
            <BreachLink {...row} />
            <BreachAside breach={breach} />
          </span>
          <span className="shrink-0">
            <BreachStatus breach={breach} />
          </span>
        </div>
        <div className="line-measures pb-6">
          <PairSample {...breach.rendered} breaches={breach.status === 'open'} />
          <RatioColumns
            ratio={breach.ratio}
            required={breach.required}
            outcome={outcomeOf(breach)}
          />
          <span className="line-where">
            {breach.theme}, {stateInWords(breach.state)}
          </span>
        </div>
      </li>
      {isOpened && (
        <li data-under className="py-14">
          {under}
        </li>
      )}
    </>
  )
}
