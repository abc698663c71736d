import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { existsSync, mkdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import {
  copyProject,
  exitOf,
  type ProjectCopy,
  READY,
  type Start,
  stop,
  untilSaid,
} from '#tests/support/project-copy.ts'

/** What a network of its own takes. */
const isRoot = process.getuid?.() === 0
const WITHOUT_NETWORK = ['unshare', '--net', 'sh', '-c', 'ip link set lo up; exec "$0" "$@"']

let copy: ProjectCopy
const running: Start[] = []

beforeEach(async () => {
  copy = await copyProject()
})

afterEach(async () => {
  for (const start of running.splice(0)) await stop(start)
  copy.remove()
})

function begin(options?: Parameters<ProjectCopy['start']>[0]): Start {
  const start = copy.start(options)
  running.push(start)
  return start
}

describe('the packages', () => {
  const INSTALL = `import { ensurePackages } from '#scripts/start/packages.mjs'
    console.log(await ensurePackages({ serving: false }))`

  /** Two of the project's own packages, from its own lock file: enough to be interrupted in. */
  function fewPackages(): void {
    rmSync(join(copy.folder, 'node_modules'), { recursive: true })
    const dependencies = { typescript: '5.9.3', picocolors: '1.1.1' }
    edit('package.json', (manifest) => ({ ...manifest, dependencies, devDependencies: {} }))
    edit('package-lock.json', (lock) => ({
      ...lock,
      packages: {
        '': { ...lock.packages[''], dependencies, devDependencies: {} },
        ...Object.fromEntries(
          Object.keys(dependencies).map((name) => {
            const path = `node_modules/${name}`
            return [path, { ...lock.packages[path], dev: undefined }]
          }),
        ),
      },
    }))
  }

  test('leaves them whole after an installation was killed, and one of two at once waits', async () => {
    fewPackages()
    const killed = spawn(process.execPath, ['--input-type=module', '-e', INSTALL], {
      cwd: copy.folder,
      stdio: 'ignore',
      detached: true,
    })
    const started = join(copy.folder, 'node_modules/typescript')
    await until(() => existsSync(started))
    process.kill(-killed.pid!, 'SIGKILL')
    await once(killed, 'exit')
    expect(existsSync(join(copy.folder, 'node_modules/.dyewright-lock'))).toBe(false)
    const both = await Promise.all([copy.runNode(INSTALL), copy.runNode(INSTALL)])
    expect(both.map(({ said }) => said.trim()).toSorted()).toEqual([
      'installed',
      'installed by another process',
    ])
    const listed = copy.shell('npm ls --all && node -e "require(\'typescript\')"')
    expect(listed.status).toBe(0)
  })

  test.runIf(isRoot)(
    'refuses in one line without a network, and needs none once they are there',
    async () => {
      const up = begin({ through: WITHOUT_NETWORK })
      await untilSaid(up, READY)
      await stop(up)
      fewPackages()
      const refused = begin({
        through: WITHOUT_NETWORK,
        env: { npm_config_cache: join(copy.folder, '.data/empty-cache') },
      })
      expect(await exitOf(refused.child)).toBe(1)
      expect(refused.output()).toContain(
        'The network does not reach the packages. They are fetched once: connect, then run this again.',
      )
    },
  )

  test('leaves alone the packages that a link leads to', async () => {
    const elsewhere = join(copy.folder, 'elsewhere')
    mkdirSync(elsewhere)
    writeFileSync(join(elsewhere, 'kept'), '')
    fewPackages()
    symlinkSync(elsewhere, join(copy.folder, 'node_modules'))
    expect((await copy.runNode(INSTALL)).said.trim()).toBe('installed')
    expect(existsSync(join(elsewhere, 'kept'))).toBe(true)
  })

  test('refuses another Node in one line', async () => {
    edit('package.json', (manifest) => ({ ...manifest, engines: { node: '>=99.1' } }))
    const refused = begin()
    expect(await exitOf(refused.child)).toBe(1)
    expect(refused.output()).toContain(`Node >=99.1 is needed; this is ${process.version}.`)
    expect(refused.output()).not.toContain('    at ')
  })
})

async function until(isSo: () => boolean): Promise<void> {
  while (!isSo()) await delay(5)
}

// biome-ignore lint/suspicious/noExplicitAny: the shape of npm's two files is npm's
function edit(file: string, change: (content: any) => unknown): void {
  const path = join(copy.folder, file)
  writeFileSync(path, JSON.stringify(change(JSON.parse(readFileSync(path, 'utf8'))), null, 2))
}
