import type { BreachEventWire } from '#shared/contracts/breaches.contract.ts'

/** A ratio that held for a while; `from` and `to` are shares of the whole time, 0 to 1. */
export interface Step {
  readonly at: string
  readonly ratio: number
  readonly from: number
  readonly to: number
  /** Whether it is long enough to carry its figure beside that of the step before. */
  readonly labelled: boolean
}

/** The least share of the time at which two figures do not touch. */
const LABEL_SHARE = 0.07

/** The events as steps from the first to now. */
export function stepsOf(events: readonly BreachEventWire[], now: string): Step[] {
  const times = [...events.map(({ at }) => Date.parse(at)), Date.parse(now)]
  const start = times[0] ?? 0
  const whole = Math.max((times.at(-1) ?? start) - start, 1)
  let shownAt = Number.NEGATIVE_INFINITY
  return events.map((event, index) => {
    const from = Math.min(((times[index] ?? start) - start) / whole, 1)
    const to = Math.min(((times[index + 1] ?? start) - start) / whole, 1)
    const isLast = index === events.length - 1
    const labelled = from - shownAt >= LABEL_SHARE && (to - from >= LABEL_SHARE || isLast)
    if (labelled) shownAt = from
    return { at: event.id, ratio: event.ratio, from, to, labelled }
  })
}
