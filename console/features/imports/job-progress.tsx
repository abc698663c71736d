import type { JobWire } from '#shared/contracts/jobs.contract.ts'

const STAGES = [
  ['read', 'read'],
  ['resolved', 'resolved'],
  ['measured', 'measured'],
] as const

const figure = (count: number): string => count.toLocaleString('en-GB')

/** How far long work is, in tokens: a line that fills, and the figures. */
export function JobProgress({ job: { progress } }: { job: JobWire }) {
  const { total } = progress
  const done = STAGES.reduce((sum, [stage]) => sum + progress[stage], 0)
  const part = total === 0 ? 0 : Math.min(1, done / (total * STAGES.length))
  return (
    <div className="pt-22 pb-24">
      <h2 className="text-16 font-semibold">{figure(total)} tokens are being read</h2>
      <p className="mt-2 max-w-560 text-ink-soft">
        This goes on whether or not you stay. The address of this page leads back to it.
      </p>
      <div
        role="progressbar"
        aria-label="The import"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={Math.round(part * 100)}
        className="mt-14 h-4 max-w-640 bg-feint forced-colors:border"
      >
        <div
          className="h-4 bg-ink forced-colors:bg-[CanvasText]"
          style={{ width: `${part * 100}%` }}
        />
      </div>
      <p role="status" className="figures mt-8 flex flex-wrap gap-x-22 text-13 text-ink-soft">
        {STAGES.map(([stage, word]) => (
          <span key={stage}>
            {figure(progress[stage])} {word}
          </span>
        ))}
      </p>
    </div>
  )
}
