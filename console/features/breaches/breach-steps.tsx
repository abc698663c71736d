import { truncateRatio } from '#shared/checks/finding-words.ts'
import { formatDay } from '#console/lib/format.ts'
import { ratioPosition } from '#console/ui/ratio-scale.ts'
import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'
import { stepsOf } from './breach-time.ts'
import { isMeasured } from './breach-words.ts'

const LEFT = 50
const WIDTH = 554
const TOP = 28
const HIGH = 130
/** The scale leaves a margin of 12 % around what it shows. */
const MARGIN = 1.12

/** The ratio over time: madder while it is short of its line, ink where it is over it. */
export function BreachSteps({
  breach,
  events,
}: {
  breach: BreachWire
  events: readonly BreachEventWire[]
}) {
  const now = breach.resolvedAt ?? new Date().toISOString()
  const measured = events.filter(isMeasured)
  const steps = stepsOf(measured, now)
  const highest = Math.max(breach.required, ...measured.map(({ ratio }) => ratio)) * MARGIN
  const lowest = Math.min(breach.required, ...measured.map(({ ratio }) => ratio)) / MARGIN
  const y = (ratio: number) => {
    const [low, high] = [ratioPosition(lowest, 1), ratioPosition(highest, 1)]
    return Math.round(TOP + ((high - ratioPosition(ratio, 1)) / (high - low)) * HIGH)
  }
  const line = y(breach.required)
  const x = (share: number) => Math.round(LEFT + share * WIDTH)
  return (
    <svg
      viewBox="0 0 620 196"
      className="figures mt-6 block w-full max-w-620 overflow-visible text-12"
      role="img"
      aria-label={summaryOf(breach, events)}
    >
      <path d={`M${LEFT} ${line + 0.5}H${LEFT + WIDTH}`} className="stroke-ink" />
      <text x={LEFT - 8} y={line + 4} textAnchor="end" className="fill-ink font-semibold">
        {breach.required}
      </text>
      <path d={`M${LEFT} ${TOP + HIGH + 12.5}H${LEFT + WIDTH}`} className="stroke-feint" />
      {steps.map((step, index) => (
        <g key={step.at}>
          <path
            d={`M${x(step.from)} ${y(step.ratio)}H${Math.max(x(step.to), x(step.from) + 3)}`}
            strokeWidth={step.ratio < breach.required ? 4 : 2}
            className={`mark-ring ${step.ratio < breach.required ? 'stroke-madder' : 'stroke-ink'}`}
          />
          {index > 0 && (
            <path
              d={`M${x(step.from)} ${y(steps[index - 1]?.ratio ?? step.ratio)}V${y(step.ratio)}`}
              className="stroke-ink-soft"
            />
          )}
          {step.labelled && (
            <text
              data-ratio
              x={x(step.from)}
              y={y(step.ratio) + (step.ratio < breach.required ? 18 : -8)}
              className={`font-semibold ${step.ratio < breach.required ? 'fill-madder' : 'fill-ink'}`}
            >
              {truncateRatio(step.ratio, 2)}
            </text>
          )}
        </g>
      ))}
      <text x={LEFT} y={TOP + HIGH + 30} className="fill-ink-soft">
        {formatDay(breach.firstSeenAt)}
      </text>
      <text x={LEFT + WIDTH} y={TOP + HIGH + 30} textAnchor="end" className="fill-ink-soft">
        {breach.resolvedAt === undefined ? 'today' : formatDay(breach.resolvedAt)}
      </text>
    </svg>
  )
}

function summaryOf(breach: BreachWire, events: readonly BreachEventWire[]): string {
  const moves = events
    .filter(isMeasured)
    .map((event) => `${truncateRatio(event.ratio, 2)} on ${formatDay(event.at)}`)
  return `Ratio over time against ${breach.required}: ${moves.join(', ')}`
}
