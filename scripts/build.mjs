// @ts-check
import { createHash } from 'node:crypto'
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { processIdentity } from '#scripts/start/processes.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const STAMP = '.stamp'
const SCRATCH = join(ROOT, '.data')
const UNFINISHED = 'unfinished-build-'
const SOURCES = [
  'api',
  'console',
  'drizzle',
  'openapi',
  'scripts',
  'shared',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
  'vite.config.ts',
]
/** Server-side programs: packages stay outside, in node_modules. */
const PROGRAMS = {
  'api/server': 'api/server.ts',
  'api/repair-worker': 'api/repair-worker.ts',
  'drizzle/migrate': 'drizzle/migrate.ts',
  'demo/accounts': 'scripts/demo/accounts.ts',
  'demo/seed': 'scripts/demo/seed.ts',
  'scripts/create-account': 'scripts/create-account.ts',
}
/** What the programs read beside themselves. */
const COPIES = {
  'drizzle/migrations': 'drizzle/migrations',
  'openapi/openapi.json': 'openapi/openapi.json',
}

/** @returns {import('esbuild').BuildOptions} */
export function programOptions() {
  return {
    absWorkingDir: ROOT,
    entryPoints: PROGRAMS,
    bundle: true,
    packages: 'external',
    format: 'esm',
    platform: 'node',
    target: 'node20',
    sourcemap: 'linked',
    logLevel: 'warning',
  }
}

/**
 * @param {string} [folder]
 * @returns {boolean} whether the folder holds a whole build of the present sources
 */
export function isBuilt(folder = join(ROOT, 'dist')) {
  const stamp = join(folder, STAMP)
  return existsSync(stamp) && readFileSync(stamp, 'utf8') === sourcesDigest()
}

/**
 * Builds everything beside the folder and moves it there as a whole: a build that breaks off leaves the
 * earlier one in place.
 * @param {string} [folder]
 */
export async function build(folder = join(ROOT, 'dist')) {
  const digest = sourcesDigest()
  removeLeftovers()
  const unfinished = join(SCRATCH, `${UNFINISHED}${process.pid}`)
  mkdirSync(unfinished, { recursive: true })
  try {
    await Promise.all([buildPrograms(unfinished), buildConsole(unfinished)])
    writeFileSync(join(unfinished, STAMP), digest)
    // Two test runs may build the same sources at once: the first to end is as good as the second.
    if (isBuilt(folder)) return
    rmSync(folder, { recursive: true, force: true })
    mkdirSync(dirname(folder), { recursive: true })
    renameSync(unfinished, folder)
  } finally {
    rmSync(unfinished, { recursive: true, force: true })
  }
}

/** A build that was killed leaves its folder, named after a process that is no more. */
function removeLeftovers() {
  if (!existsSync(SCRATCH)) return
  for (const name of readdirSync(SCRATCH)) {
    if (!name.startsWith(UNFINISHED)) continue
    if (processIdentity(Number(name.slice(UNFINISHED.length))) !== undefined) continue
    rmSync(join(SCRATCH, name), { recursive: true, force: true })
  }
}

/**
 * Everything but the console.
 * @param {string} folder
 */
export async function buildPrograms(folder) {
  const esbuild = await import('esbuild')
  await Promise.all([esbuild.build({ ...programOptions(), outdir: folder }), buildGate(folder)])
  await esbuild.stop()
  for (const [to, from] of Object.entries(COPIES)) {
    cpSync(join(ROOT, from), join(folder, to), { recursive: true })
  }
}

/**
 * The client that pipelines fetch: one file, nothing to install.
 * @param {string} folder
 */
async function buildGate(folder) {
  const esbuild = await import('esbuild')
  const outfile = join(folder, 'gate/dyewright.mjs')
  await esbuild.build({
    absWorkingDir: ROOT,
    entryPoints: ['scripts/gate/gate.ts'],
    outfile,
    bundle: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    minifySyntax: true,
    minifyWhitespace: true,
    legalComments: 'inline',
    logLevel: 'warning',
    banner: {
      // CommonJS packages inside the bundle ask for Node's own modules through `require`.
      js: "#!/usr/bin/env node\nimport { createRequire } from 'node:module';const require = createRequire(import.meta.url);",
    },
  })
  chmodSync(outfile, 0o755)
}

/** @param {string} folder */
async function buildConsole(folder) {
  const vite = await import('vite')
  const mode = process.env.NODE_ENV
  // Vite keeps a NODE_ENV that is set: tests would be given React's development build.
  process.env.NODE_ENV = 'production'
  try {
    await vite.build({
      configFile: join(ROOT, 'vite.config.ts'),
      mode: 'production',
      logLevel: 'warn',
      build: { outDir: join(folder, 'console') },
    })
  } finally {
    if (mode === undefined) Reflect.deleteProperty(process.env, 'NODE_ENV')
    else process.env.NODE_ENV = mode
  }
}

/** @returns {string} */
export function sourcesDigest() {
  const hash = createHash('sha256')
  for (const source of SOURCES) {
    for (const file of listFiles(source))
      hash.update(`${file}\0`).update(readFileSync(join(ROOT, file)))
  }
  return hash.digest('hex')
}

/**
 * @param {string} path
 * @returns {string[]}
 */
function listFiles(path) {
  if (!existsSync(join(ROOT, path))) return []
  if (/\.[a-z]+$/.test(path)) return [path]
  return readdirSync(join(ROOT, path), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name).slice(ROOT.length))
    .sort()
}

if (process.argv[1] !== undefined && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  await build()
}
