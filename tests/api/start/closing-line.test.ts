import { spawnSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { DATA, ROOT } from '#scripts/start/project.mjs'

let folder: string

beforeEach(() => {
  mkdirSync(DATA, { recursive: true })
  folder = mkdtempSync(join(DATA, 'closing-'))
})

afterEach(() => rmSync(folder, { recursive: true, force: true }))

const PASSING = "import { test } from 'vitest'\ntest('passes', () => {})\n"

describe('the closing line', () => {
  test('answers what passed and what was skipped, as the very last line', () => {
    write('a.test.mjs', `${PASSING}test.skip('later', () => {})\n`)
    expect(run()).toEqual({ status: 0, lastLine: '1 passed, 0 failed, 1 skipped' })
  })

  test('answers a failed test, a file that does not load and a failing hook as failed', () => {
    write('a.test.mjs', PASSING)
    write(
      'b.test.mjs',
      "import { expect, test } from 'vitest'\ntest('x', () => expect(1).toBe(2))\n",
    )
    write('c.test.mjs', "import './missing.mjs'\n")
    write(
      'd.test.mjs',
      `import { beforeAll, describe, test } from 'vitest'
       describe('d', () => { beforeAll(() => { throw new Error('no') }); test('y', () => {}) })`,
    )
    expect(run()).toEqual({ status: 1, lastLine: '1 passed, 3 failed, 1 skipped' })
  })

  test('answers an error outside any test as failed', () => {
    write(
      'a.test.mjs',
      `${PASSING}setTimeout(() => { throw new Error('late') }, 0)
      test('waits', () => new Promise((resolve) => setTimeout(resolve, 100)))\n`,
    )
    expect(run()).toEqual({ status: 1, lastLine: '2 passed, 1 failed, 0 skipped' })
  })

  test('leaves the numbers in the file that a caller names', () => {
    write('a.test.mjs', PASSING)
    const file = join(folder, 'count.json')
    expect(run({ CLOSING_COUNT_FILE: file }).lastLine).not.toMatch(/passed, .*failed/)
    expect(JSON.parse(readFileSync(file, 'utf8'))).toEqual({ passed: 1, failed: 0, skipped: 0 })
  })
})

function write(name: string, text: string): void {
  writeFileSync(join(folder, name), text)
}

function run(env: NodeJS.ProcessEnv = {}) {
  const { CLOSING_COUNT_FILE: _, ...rest } = process.env
  writeFileSync(
    join(folder, 'vitest.config.mjs'),
    `export default { test: { include: ['*.test.mjs'], reporters: ['default', ${JSON.stringify(
      join(ROOT, 'tests/support/closing-line-reporter.ts'),
    )}] } }`,
  )
  const done = spawnSync(
    process.execPath,
    [join(ROOT, 'node_modules/vitest/vitest.mjs'), 'run', '--root', folder],
    { cwd: folder, encoding: 'utf8', env: { ...rest, ...env } },
  )
  return { status: done.status, lastLine: done.stdout.trim().split('\n').at(-1) }
}
