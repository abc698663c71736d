import { fork } from 'node:child_process'
import { once } from 'node:events'
import { type BenchResult, median } from './measure.ts'

const MEBIBYTE = 1024 ** 2
const MOST = 150

/** What a check of 5,000 tokens and 10,000 pairs takes at most, over the idle process. */
export async function* memoryBench(): AsyncGenerator<BenchResult> {
  const runs = [await oneRun(), await oneRun(), await oneRun()]
  const idle = median(runs.map((run) => run.idle)) / MEBIBYTE
  const value = median(runs.map((run) => run.peak - run.idle)) / MEBIBYTE
  yield {
    name: 'check.memory',
    value,
    unit: 'MiB',
    baseline: idle,
    ratio: value / idle,
    target: `≤ ${MOST} MiB over idle`,
    met: value <= MOST,
  }
}

async function oneRun(): Promise<{ idle: number; peak: number }> {
  const child = fork(new URL('./memory-child.ts', import.meta.url), {
    execArgv: ['--import', 'tsx'],
  })
  const [told] = await once(child, 'message')
  return told as { idle: number; peak: number }
}
