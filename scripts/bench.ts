import { parseArgs } from 'node:util'
import { browserBench } from './bench/browser-bench.ts'
import { checkBench, recheckBench, shadeCardBench } from './bench/check-bench.ts'
import type { BenchResult } from './bench/measure.ts'
import { memoryBench } from './bench/memory-bench.ts'

/**
 * `npm run bench`: what is claimed of speed and memory, each against a baseline of the same run. It fails nothing:
 * a machine that is busy measures badly. `--json` writes the results and nothing else to standard output.
 */
const { values } = parseArgs({ options: { json: { type: 'boolean', default: false } } })
const PARTS = [checkBench, recheckBench, shadeCardBench, memoryBench, browserBench]
const HEAD = ['name', 'value', 'baseline', 'ratio', 'target', ''] as const

const results: BenchResult[] = []
if (!values.json) writeLine(HEAD)
for (const part of PARTS) {
  for await (const result of part()) {
    results.push(result)
    if (!values.json) writeLine(cellsOf(result))
  }
}
if (values.json) process.stdout.write(`${JSON.stringify({ results: results.map(asClaimed) })}\n`)

function asClaimed({ met: _, ...result }: BenchResult): Omit<BenchResult, 'met'> {
  return result
}

function cellsOf({ name, value, baseline, unit, ratio, target, met }: BenchResult): string[] {
  const figure = (number: number) => `${number.toFixed(number < 100 ? 1 : 0)} ${unit}`
  return [name, figure(value), figure(baseline), ratio.toFixed(2), target, met ? '' : 'missed']
}

function writeLine([name = '', ...cells]: readonly string[]): void {
  const [value = '', baseline = '', ratio = '', target = '', met = ''] = cells
  const figures = `${value.padStart(14)}${baseline.padStart(14)}${ratio.padStart(9)}`
  const line = `${name.padEnd(16)}${figures}  ${target.padEnd(20)}${met}`
  process.stdout.write(`${line.trimEnd()}\n`)
}
