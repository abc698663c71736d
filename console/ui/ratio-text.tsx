import { truncateRatio } from '#shared/checks/finding-words.ts'
import type { Outcome } from '#shared/checks/model.ts'

/** A ratio, what it needs, and how that was judged: a pair may pass under its line, by its group or an exemption. */
export interface Measured {
  readonly ratio: number
  /** 0 where nothing is required. */
  readonly required: number
  readonly outcome: Outcome
}

/**
 * What it measures, of what it needs: `3.88 of 4.5`; a breach in madder. Two aligned columns: the figure ends at
 * the decimal column, `of 4.5` has 46 px of its own.
 */
export function RatioColumns(measured: Measured) {
  return (
    <span className="figures inline-flex whitespace-nowrap">
      <Figure {...measured} />
      <span className="ml-6 w-46 text-start text-ink-soft">
        {measured.required > 0 && `of ${measured.required}`}
      </span>
    </span>
  )
}

const FIGURES: { readonly [outcome in Outcome]: string } = {
  pass: 'font-medium',
  breach: 'font-semibold text-madder',
  known: 'font-semibold text-madder',
  waived: 'font-semibold',
  exempt: 'font-medium',
}

function Figure({ ratio, outcome }: Measured) {
  return (
    <span data-ratio className={FIGURES[outcome]}>
      {truncateRatio(ratio, 2)}
    </span>
  )
}

/** Before and after a trial: `3.88 → 6.36 of 4.5`. */
export function RatioMove({ before, ...measured }: Measured & { before: number | undefined }) {
  return (
    <span className="figures ml-auto inline-flex items-baseline whitespace-nowrap">
      {before !== undefined && (
        <>
          <span data-ratio="before" className="min-w-38 text-end">
            {truncateRatio(before, 2)}
          </span>
          <Arrow />
        </>
      )}
      <span className="inline-flex min-w-94 justify-end">
        <RatioColumns {...measured} />
      </span>
    </span>
  )
}

/** An arrow of our own: the shipped subset of Inter has none. */
export function Arrow() {
  return (
    <svg viewBox="0 0 12 8" width="12" height="8" role="img" aria-label="to" className="mx-8">
      <path d="M0 4h10.5M7.5 1l3 3-3 3" fill="none" className="stroke-ink-soft" strokeWidth="1.2" />
    </svg>
  )
}
