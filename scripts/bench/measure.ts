/** One line of the table. Times are in milliseconds of CPU unless the unit says otherwise. */
export interface BenchResult {
  readonly name: string
  readonly value: number
  readonly unit: string
  /** What it is compared with, measured in the same run; in the unit of `value`. */
  readonly baseline: number
  /** How often better than the baseline, or how often the baseline, as the target says. */
  readonly ratio: number
  readonly target: string
  readonly met: boolean
}

/**
 * The median of several runs, in milliseconds of CPU: what the process and its collector threads worked, which a busy
 * machine does not stretch as it does the clock. The first run warms up and does not count.
 */
export function medianMs(runs: number, work: (run: number) => unknown): number {
  const times: number[] = []
  for (let run = -1; run < runs; run += 1) {
    const from = process.cpuUsage()
    work(run)
    const { user, system } = process.cpuUsage(from)
    if (run >= 0) times.push((user + system) / 1000)
  }
  return median(times)
}

export function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b)
  const middle = Math.floor(sorted.length / 2)
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}
