import { writeFileSync } from 'node:fs'
import type { Reporter, TestModule } from 'vitest/node'

/**
 * Ends the run with the one line that a person or a pipeline reads: `N passed, N failed, N skipped`.
 * Under `npm test`, which adds the lint and the types, the numbers go to the file that it names instead.
 * A file that could not be loaded, and an error outside any test, count as failed.
 */
// biome-ignore lint/style/noDefaultExport: vitest loads a reporter named by path from its default export.
export default class ClosingLineReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], unhandledErrors: readonly unknown[]): void {
    const count = { passed: 0, failed: unhandledErrors.length, skipped: 0 }
    for (const module of modules) {
      if (module.errors().length > 0) count.failed += 1
      for (const suite of module.children.allSuites()) {
        if (suite.errors().length > 0) count.failed += 1
      }
      for (const test of module.children.allTests()) {
        const { state } = test.result()
        count[state === 'pending' ? 'failed' : state] += 1
      }
    }
    const { CLOSING_COUNT_FILE: countFile } = process.env
    if (countFile) {
      writeFileSync(countFile, JSON.stringify(count))
    } else {
      const line = `${count.passed} passed, ${count.failed} failed, ${count.skipped} skipped`
      process.once('exit', () => process.stdout.write(`${line}\n`))
    }
  }
}
