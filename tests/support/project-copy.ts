import { type ChildProcess, spawn, spawnSync } from 'node:child_process'
import { once } from 'node:events'
import { chmodSync, cpSync, existsSync, mkdtempSync, rmSync, symlinkSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { inject } from 'vitest'
import { freePort } from '#scripts/start/free-port.mjs'
import { isInstalled } from '#scripts/start/packages.mjs'

const ROOT = process.cwd()

/** What `npm start` says last. */
export const READY = 'Dyewright is ready:'

export interface Start {
  readonly child: ChildProcess
  readonly output: () => string
}

export interface StartOptions {
  readonly env?: NodeJS.ProcessEnv
  /** A command that runs `node scripts/start.mjs` as its arguments. */
  readonly through?: readonly string[]
}

type NodeRun = Promise<{ readonly code: number | null; readonly said: string }> & {
  soFar(): string
}

/** A copy of the project as it is, so that a service running in this folder is left alone. */
export interface ProjectCopy {
  readonly folder: string
  readonly url: string
  start(options?: StartOptions): Start
  /** 0 where nobody listens. */
  statusOf(path: string): Promise<number>
  shell(command: string): ReturnType<typeof spawnSync>
  /** Runs a module of the copy's to its end; `soFar` is what it has said until now. */
  runNode(script: string, through?: readonly string[]): NodeRun
  remove(): void
}

/** With this folder's packages, by a link. */
export async function copyProject(): Promise<ProjectCopy> {
  requirePackages()
  const folder = mkdtempSync(join(tmpdir(), 'dyw-start-'))
  chmodSync(folder, 0o755)
  for (const file of projectFiles()) cpSync(join(ROOT, file), join(folder, file))
  symlinkSync(join(ROOT, 'node_modules'), join(folder, 'node_modules'))
  cpSync(inject('dist'), join(folder, 'dist'), { recursive: true })
  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  return {
    folder,
    url,
    start: (options) => start(folder, port, options),
    statusOf: (path) => statusOf(`${url}${path}`),
    shell: (command) => shell(folder, command),
    runNode: (script, through) => runNode(folder, script, through),
    remove: () => rmSync(folder, { recursive: true, force: true }),
  }
}

/** A start that found them stale would install through the link, into this folder. */
function requirePackages(): void {
  if (!isInstalled()) throw new Error('the packages are not those of the lock file: run npm test')
}

function projectFiles(): string[] {
  const listed = spawnSync('git', ['ls-files', '--cached', '--others', '--exclude-standard'], {
    encoding: 'utf8',
  })
  return listed.stdout.split('\n').filter((file) => file !== '' && existsSync(join(ROOT, file)))
}

function start(folder: string, port: number, { env = {}, through = [] }: StartOptions = {}): Start {
  // What the test run sets for itself must not reach the service.
  const { NODE_ENV: _, VITEST: __, DATABASE_URL: ___, ...rest } = process.env
  const [program = '', ...args] = [...through, process.execPath, 'scripts/start.mjs']
  const child = spawn(program, args, {
    cwd: folder,
    env: { ...rest, PORT: String(port), ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let said = ''
  for (const stream of [child.stdout, child.stderr]) {
    stream?.setEncoding('utf8').on('data', (text) => {
      said += text
    })
  }
  return { child, output: () => said }
}

export async function stop({ child }: Start): Promise<number | null> {
  child.kill('SIGTERM')
  return exitOf(child)
}

export async function exitOf(child: ChildProcess): Promise<number | null> {
  if (child.exitCode === null && child.signalCode === null) await once(child, 'exit')
  return child.exitCode
}

export async function untilSaid({ child, output }: Start, words: string): Promise<void> {
  while (!output().includes(words)) {
    if (child.exitCode !== null) throw new Error(`ended without saying "${words}":\n${output()}`)
    await delay(50)
  }
}

async function statusOf(url: string): Promise<number> {
  try {
    const answer = await fetch(url)
    await answer.arrayBuffer()
    return answer.status
  } catch {
    return 0
  }
}

function shell(folder: string, command: string) {
  const node = dirname(process.execPath)
  return spawnSync('bash', ['-c', command], {
    cwd: folder,
    encoding: 'utf8',
    env: { ...process.env, PATH: `${node}:${process.env.PATH}` },
  })
}

function runNode(folder: string, script: string, through: readonly string[] = []): NodeRun {
  const [program = '', ...args] = [
    ...through,
    process.execPath,
    '--input-type=module',
    '-e',
    script,
  ]
  const child = spawn(program, args, { cwd: folder, stdio: ['ignore', 'pipe', 'pipe'] })
  let said = ''
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding('utf8').on('data', (text) => {
      said += text
    })
  }
  const ended = once(child, 'close').then(() => ({ code: child.exitCode, said }))
  return Object.assign(ended, { soFar: () => said })
}
