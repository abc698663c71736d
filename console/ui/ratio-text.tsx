import { truncateRatio } from '#console/lib/format.ts'

export interface Measured {
  readonly ratio: number
  /** 0 where nothing is required. */
  readonly required: number
}

/** What it measures, of what it needs: `3.88 of 4.5`; short of it in madder, waived in weld. */
export function RatioText({ ratio, required, waived = false }: Measured & { waived?: boolean }) {
  return (
    <span className="figures whitespace-nowrap">
      <Figure ratio={ratio} required={required} waived={waived} />
      {required > 0 && <span className="ml-6 text-ink-soft">of {required}</span>}
    </span>
  )
}

/** The same as two aligned columns: the figure ends at the decimal column, `of 4.5` begins 46 px of its own. */
export function RatioColumns({ ratio, required, waived = false }: Measured & { waived?: boolean }) {
  return (
    <span className="figures inline-flex whitespace-nowrap">
      <Figure ratio={ratio} required={required} waived={waived} />
      <span className="ml-6 w-46 text-start text-ink-soft">{required > 0 && `of ${required}`}</span>
    </span>
  )
}

function Figure({ ratio, required, waived }: Measured & { waived: boolean }) {
  const short = ratio < required
  const style = !short ? 'font-medium' : waived ? 'font-semibold' : 'font-semibold text-madder'
  return <span className={style}>{truncateRatio(ratio, 2)}</span>
}

/** Before and after a trial: `3.88 → 6.36 of 4.5`. */
export function RatioMove({ before, ratio, required }: Measured & { before: number | undefined }) {
  return (
    <span className="figures inline-flex items-baseline whitespace-nowrap">
      {before !== undefined && (
        <>
          <span className="min-w-38 text-end">{truncateRatio(before, 2)}</span>
          <Arrow />
        </>
      )}
      <span className="inline-flex min-w-90 justify-end">
        <RatioColumns ratio={ratio} required={required} />
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
