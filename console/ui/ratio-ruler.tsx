import type { Outcome } from '#shared/checks/model.ts'
import { RATIO_LINES, ratioPosition } from './ratio-scale.ts'
import type { Measured } from './ratio-text.tsx'

/** Width of the ruler in a table, px. */
export const RULER_WIDTH = 244

/** One row of the ruler: a stroke at the required line, and a line from it to the measured place. */
export function RatioRuler({
  measured,
  height = 37,
}: {
  measured: Measured | null
  height?: number
}) {
  return (
    <svg
      viewBox={`0 0 ${RULER_WIDTH} ${height}`}
      width={RULER_WIDTH}
      height={height}
      aria-hidden="true"
      className="block overflow-visible"
    >
      {RATIO_LINES.map((line) => (
        <path
          key={line}
          d={`M${Math.round(ratioPosition(line, RULER_WIDTH)) + 0.5} -1v${height + 1}`}
          className="stroke-feint"
        />
      ))}
      {measured !== null && measured.required > 0 && (
        <Reach {...measured} middle={Math.floor(height / 2)} />
      )}
    </svg>
  )
}

const FILLS: { readonly [outcome in Outcome]: string } = {
  pass: 'fill-ink',
  breach: 'fill-madder',
  known: 'fill-madder',
  waived: 'fill-weld',
  exempt: 'fill-ink-soft',
}

function Reach({ ratio, required, outcome, middle }: Measured & { middle: number }) {
  const from = Math.round(ratioPosition(required, RULER_WIDTH))
  const to = ratioPosition(ratio, RULER_WIDTH)
  const short = ratio < required
  const fill = FILLS[outcome]
  const thickness = outcome === 'breach' || outcome === 'known' ? 3 : 1.5
  const tick = short ? to - 1.5 : to - 3
  return (
    <>
      <path d={`M${from} ${middle - 8}h1v16h-1z`} className="fill-ink-soft" />
      <path
        d={`M${from} ${middle - thickness / 2}H${to}v${thickness}H${from}z`}
        className={`mark-shape ${fill}`}
      />
      <path d={`M${tick} ${middle - 6}h3v12h-3z`} className={`mark-shape ${fill}`} />
    </>
  )
}

/** The figures over a column of rulers. */
export function RulerHead() {
  return (
    <span className="figures relative block h-16" aria-hidden="true">
      <span className="absolute left-0">1</span>
      {RATIO_LINES.map((line) => (
        <span
          key={line}
          className="absolute -translate-x-1/2"
          style={{ left: ratioPosition(line, RULER_WIDTH) }}
        >
          {line}
        </span>
      ))}
      <span className="absolute" style={{ left: RULER_WIDTH - 14 }}>
        21
      </span>
    </span>
  )
}
