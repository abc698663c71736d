// @ts-check
import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { build, buildPrograms, isBuilt } from '#scripts/build.mjs'
import { DEVELOPMENT, serveForDevelopment } from '#scripts/start/development.mjs'
import { holdLock, LOCKS } from '#scripts/start/lock.mjs'
import { endMariadb, ensureMariadb } from '#scripts/start/mariadb.mjs'
import { checkNodeVersion } from '#scripts/start/node-version.mjs'
import { ensurePackages } from '#scripts/start/packages.mjs'
import { requireFreePort } from '#scripts/start/port-holder.mjs'
import { MARIADB_FOLDER, openPrivateDatabase } from '#scripts/start/private-database.mjs'
import { endProcess, findOrphans, processIdentity } from '#scripts/start/processes.mjs'
import { DATA, DIST, ROOT } from '#scripts/start/project.mjs'
import { runProgram } from '#scripts/start/run-program.mjs'
import { contentsOf, pendingSeed } from '#scripts/start/seeding.mjs'
import { startService } from '#scripts/start/service.mjs'
import { readSettings } from '#scripts/start/settings.mjs'
import { isStopping, onStop, runOrStop, stopAll, stopOnSignals } from '#scripts/start/shutdown.mjs'
import { StepFailure, step } from '#scripts/start/steps.mjs'
import { describeReady } from '#scripts/start/welcome.mjs'

/** Every process of a start carries this variable: the identity of the start. */
const START_VARIABLE = 'DYEWRIGHT_START'
const UP_WITHIN_MS = 30_000

const forDevelopment = process.argv.includes('--dev')
const programs = forDevelopment ? DEVELOPMENT : DIST

stopOnSignals()
await runOrStop(async () => {
  const settings = readSettings(process.env)
  await step('Node', (say) => say(checkNodeVersion()))
  await takeFolder(settings)
  await step('Packages', async (say) => say(await ensurePackages({ serving: true })))
  const seed = pendingSeed(settings.databaseUrl)
  const database = await openDatabase(settings, seed)
  await step('Build', async (say) => {
    if (forDevelopment) return buildPrograms(programs)
    if (isBuilt()) return say('unchanged')
    await build()
  })
  await migrate(database)
  const contents = await contentsOf(database.serveUrl)
  const seeding = contents === 'empty' && !settings.production
  if (seeding) seed.begin()
  const env = serviceEnvironment(settings, database, seed.file)
  if (seeding) await step('Accounts', () => runBuilt('demo/accounts.js', [], env))
  const serve = forDevelopment ? serveForDevelopment : serveBuilt
  const service = await step('Service', () => serve({ settings, env }))
  if (seeding) {
    await step('Demo', () =>
      runBuilt('demo/seed.js', ['--url', settings.url, '--key-file', seed.keyFile], env),
    )
    seed.end()
  }
  await service.untilOk('/readyz', UP_WITHIN_MS)
  const showDemo = !settings.production && (seeding || contents === 'demo')
  console.log(
    describeReady({
      url: settings.url,
      gate: join(programs, 'gate/dyewright.mjs'),
      demoKeyFile: showDemo ? seed.keyFile : undefined,
    }),
  )
})

/** @param {import('#scripts/start/settings.mjs').Settings} settings */
async function takeFolder(settings) {
  mkdirSync(DATA, { recursive: true, mode: 0o700 })
  const { holder } = await holdLock(LOCKS.serving)
  if (holder !== undefined) {
    throw new StepFailure(`npm start already runs in this folder: process ${holder}.`)
  }
  await endMariadb(MARIADB_FOLDER)
  const orphans = findOrphans(START_VARIABLE, { under: ROOT })
  if (orphans.length > 0) {
    await step('Tidying', async (say) => {
      await Promise.all(orphans.map((pid) => endProcess(pid, { patienceMs: 3_000 })))
      say(`ended ${orphans.length} left by a start that was killed`)
    })
  }
  process.env[START_VARIABLE] = processIdentity(process.pid)
  await requireFreePort(settings)
}

/**
 * @param {import('#scripts/start/settings.mjs').Settings} settings
 * @param {ReturnType<typeof pendingSeed>} seed
 * @returns {Promise<Omit<import('#scripts/start/private-database.mjs').Database, 'stop'>>}
 */
async function openDatabase({ databaseUrl, migrateDatabaseUrl }, seed) {
  if (databaseUrl !== undefined) {
    if (seed.isPending()) {
      throw new StepFailure(
        'Loading the demo into the database of DATABASE_URL broke off earlier.\n' +
          `Empty that database, remove ${seed.file}, and start again.`,
      )
    }
    const migrateUrl = migrateDatabaseUrl ?? databaseUrl
    return { serveUrl: databaseUrl, migrateUrl, grantTo: undefined }
  }
  await step('MariaDB', async (say) => say(await ensureMariadb()))
  return step('Database', async (say) => {
    onStop(() => endMariadb(MARIADB_FOLDER))
    const afresh = seed.isPending()
    const database = await openPrivateDatabase({ afresh, log: (line) => console.log(line) })
    onStop(database.stop)
    say(afresh ? 'the demo broke off earlier: begun afresh' : 'private, in .data')
    return database
  })
}

/** @param {{ migrateUrl: string, grantTo: string | undefined }} database */
async function migrate({ migrateUrl, grantTo }) {
  await step('Migrations', async (say) => {
    const env = { ...process.env, MIGRATE_DATABASE_URL: migrateUrl }
    const args = grantTo === undefined ? [] : ['--grant-to', grantTo]
    say((await runBuilt('drizzle/migrate.js', args, env)).trim())
  })
}

/**
 * @param {import('#scripts/start/settings.mjs').Settings} settings
 * @param {{ serveUrl: string }} database
 * @param {string} seedPendingFile
 * @returns {NodeJS.ProcessEnv}
 */
function serviceEnvironment({ host, port, production }, { serveUrl }, seedPendingFile) {
  // The service gets no right to alter tables, so it gets no address that has it.
  const { MIGRATE_DATABASE_URL: _, ...rest } = process.env
  return {
    ...rest,
    NODE_ENV: production ? 'production' : 'development',
    HOST: host,
    PORT: String(port),
    DATABASE_URL: serveUrl,
    ...(production ? {} : { SEED_PENDING_FILE: seedPendingFile }),
  }
}

/** @param {{ settings: import('#scripts/start/settings.mjs').Settings, env: NodeJS.ProcessEnv }} options */
async function serveBuilt({ settings, env }) {
  const service = startService({
    script: join(programs, 'api/server.js'),
    cwd: ROOT,
    url: settings.url,
    env,
    logFile: settings.production ? undefined : join(DATA, 'service.log'),
  })
  onStop(service.stop)
  await service.untilOk('/healthz', UP_WITHIN_MS)
  void service.exited.then(() => {
    if (isStopping()) return
    console.error(
      `The service has ended. Its log: ${settings.production ? 'above' : '.data/service.log'}`,
    )
    return stopAll(1)
  })
  return service
}

/**
 * @param {string} program below the programs' folder
 * @param {string[]} args
 * @param {NodeJS.ProcessEnv} env
 */
function runBuilt(program, args, env) {
  return runProgram(process.execPath, [join(programs, program), ...args], { cwd: ROOT, env })
}
