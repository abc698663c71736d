import { build } from 'esbuild'
import { chromium } from 'playwright-core'
import { findProgram } from '#scripts/start/debian.mjs'
import type { BenchResult } from './measure.ts'

const CHIPS = 200
const RUNS = 5
const A_SECOND = 60

/** Two hundred colours tried in Chromium, each with everything that it moves. */
export async function* browserBench(): AsyncGenerator<BenchResult> {
  const executablePath = findProgram('chromium')
  if (executablePath === undefined)
    throw new Error('chromium is not installed: npm test installs it')
  const browser = await chromium.launch({ executablePath, args: ['--no-sandbox'] })
  try {
    const page = await browser.newPage()
    await page.addScriptTag({ content: await bundle() })
    const rates: number[] = []
    for (let run = 0; run <= RUNS; run += 1) {
      const times = await page.evaluate<number[]>(`bench.tryChips(${CHIPS})`)
      if (run > 0) rates.push((CHIPS / times.reduce((sum, time) => sum + time, 0)) * 1000)
    }
    const value = rates.toSorted((a, b) => a - b)[Math.floor(RUNS / 2)]!
    yield {
      name: 'chips.browser',
      value,
      unit: 'chips/s',
      baseline: A_SECOND,
      ratio: value / A_SECOND,
      target: `≥ ${A_SECOND} a second`,
      met: value >= A_SECOND,
    }
  } finally {
    await browser.close()
  }
}

async function bundle(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: ['scripts/bench/page-chips.ts'],
    bundle: true,
    write: false,
    format: 'iife',
    globalName: 'bench',
    target: 'es2022',
  })
  return outputFiles[0]!.text
}
