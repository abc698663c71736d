// @ts-check
import { spawn } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { ensurePrograms } from '#scripts/start/debian.mjs'
import { ensureMariadb } from '#scripts/start/mariadb.mjs'
import { checkNodeVersion } from '#scripts/start/node-version.mjs'
import { ensurePackages } from '#scripts/start/packages.mjs'
import { ROOT } from '#scripts/start/project.mjs'
import { endRunning, runProgram } from '#scripts/start/run-program.mjs'
import { describeFailure, StepFailure, step } from '#scripts/start/steps.mjs'
import { reapLeftovers } from '#scripts/start/throw-away.mjs'

/** `npm run check`: everything that needs no browser. */
const CHECK_PROJECTS = ['unit', 'api', 'conformance']

const [mode, ...rest] = process.argv.slice(2)
const isCheck = mode === 'check'
const vitestArgs = isCheck
  ? [...CHECK_PROJECTS.flatMap((project) => ['--project', project]), ...rest]
  : process.argv.slice(2)
/** With arguments of one's own (`npm test -- --project unit`) only those tests run. */
const isWhole = isCheck || vitestArgs.length === 0
const count = { passed: 0, failed: 0, skipped: 0 }
let interrupted = false

for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(name, () => {
    interrupted = true
    void endRunning()
  })
}
process.once('exit', () => {
  process.stdout.write(`${count.passed} passed, ${count.failed} failed, ${count.skipped} skipped\n`)
})

try {
  await setUp()
  if (isWhole) await checkSources()
  if (!interrupted) await runTests()
} catch (error) {
  count.failed += 1
  console.error(`\n${describeFailure(error)}`)
}
await reapLeftovers()
process.exitCode = interrupted ? 130 : count.failed > 0 ? 1 : 0

async function setUp() {
  await step('Node', (say) => say(checkNodeVersion()))
  await step('Packages', async (say) => say(await ensurePackages({ serving: false })))
  await step('MariaDB', async (say) => say(await ensureMariadb()))
  await step('Little CMS', async (say) =>
    say(await ensurePrograms({ programs: ['transicc'], packages: ['liblcms2-utils'] })),
  )
  if (isCheck) return
  await step('Chromium', async (say) =>
    say(await ensurePrograms({ programs: ['chromium'], packages: ['chromium'] })),
  )
}

/** The lint and the types count as one test each in the closing line. */
async function checkSources() {
  await Promise.all([
    countStep('Lint', 'node_modules/@biomejs/biome/bin/biome', ['check', '--error-on-warnings']),
    countStep('Types', 'node_modules/typescript/bin/tsc', ['--noEmit']),
  ])
}

/**
 * @param {string} name
 * @param {string} script
 * @param {string[]} args
 */
async function countStep(name, script, args) {
  try {
    await step(name, () =>
      runProgram(process.execPath, [join(ROOT, script), ...args], { cwd: ROOT }),
    )
    count.passed += 1
  } catch (error) {
    if (!(error instanceof StepFailure)) throw error
    count.failed += 1
    console.error(error.message)
  }
}

async function runTests() {
  const folder = mkdtempSync(join(tmpdir(), 'dyw-count-'))
  const countFile = join(folder, 'count.json')
  try {
    const code = await runVitest(countFile)
    const counted = existsSync(countFile) ? JSON.parse(readFileSync(countFile, 'utf8')) : undefined
    count.passed += counted?.passed ?? 0
    count.skipped += counted?.skipped ?? 0
    // A run that ended badly without a failed test (it crashed, a threshold, no test found) is a failure too.
    const failed = counted?.failed ?? 0
    count.failed += code !== 0 && failed === 0 ? 1 : failed
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

/**
 * @param {string} countFile
 * @returns {Promise<number | null>}
 */
function runVitest(countFile) {
  return new Promise((resolve, reject) => {
    const child = spawn(
      process.execPath,
      [join(ROOT, 'node_modules/vitest/vitest.mjs'), 'run', ...vitestArgs],
      { cwd: ROOT, stdio: 'inherit', env: { ...ownEnvironment(), CLOSING_COUNT_FILE: countFile } },
    )
    for (const name of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
      process.on(name, () => child.kill(name))
    }
    child.once('error', reject)
    child.once('exit', resolve)
  })
}

/** Settings of a service of this person's are none of the tests' business. */
function ownEnvironment() {
  const env = { ...process.env, NODE_ENV: 'test' }
  for (const name of ['DATABASE_URL', 'MIGRATE_DATABASE_URL', 'HOST', 'PORT', 'PUBLIC_URL']) {
    Reflect.deleteProperty(env, name)
  }
  return env
}
