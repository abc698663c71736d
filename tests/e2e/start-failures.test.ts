import { spawn, spawnSync } from 'node:child_process'
import { once } from 'node:events'
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as delay } from 'node:timers/promises'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { findProcesses, processIdentity } from '#scripts/start/processes.mjs'
import {
  copyProject,
  exitOf,
  type ProjectCopy,
  READY,
  type Start,
  stop,
  untilSaid,
} from '#tests/support/project-copy.ts'

/** What a test of another user, a disk or a network of its own takes. */
const isRoot = process.getuid?.() === 0
const NOBODY = 65_534

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

describe('npm start after one that broke off', () => {
  test('leaves a database whole that was killed while it was created, and again while migrating', async () => {
    const unfinished = join(copy.folder, '.data/mariadb.tmp')
    const first = begin()
    await until(() => existsSync(join(unfinished, 'mysql')))
    await killWithPrograms(first, `--datadir=${unfinished}`)
    expect(existsSync(join(copy.folder, '.data/mariadb'))).toBe(false)
    const second = begin()
    await until(() => existsSync(join(copy.folder, '.data/mariadb/dyewright/breaches.frm')))
    await killWithPrograms(second, join(copy.folder, 'dist/drizzle/migrate.js'))
    expect(second.output()).not.toContain('Migrations')
    const third = begin()
    await untilSaid(third, READY)
    expect(await copy.statusOf('/readyz')).toBe(200)
    expect(findProcesses(`--datadir=${join(copy.folder, '.data/mariadb')}`)).toHaveLength(1)
  })

  test('answers one of two begun at once, and the other says who runs', async () => {
    const both = [begin(), begin()]
    const ended = await Promise.race(
      both.map(async (start) => {
        await exitOf(start.child)
        return start
      }),
    )
    const [other] = both.filter((start) => start !== ended)
    expect(ended.output()).toContain(
      `npm start already runs in this folder: process ${other?.child.pid}.`,
    )
    await untilSaid(other!, READY)
  })

  test.runIf(isRoot)('leaves alone a stranger that has the pid of a killed start', async () => {
    const killed = begin()
    await until(() => findProcesses(join(copy.folder, 'dist/api/server.js')).length === 1)
    const [service] = findProcesses(join(copy.folder, 'dist/api/server.js'))
    const identity = processIdentity(service!)
    killed.child.kill('SIGKILL')
    await exitOf(killed.child)
    const stranger = await sleeperWithPid(killed.child.pid!)
    try {
      const next = begin()
      await untilSaid(next, READY)
      expect(next.output()).toMatch(/^Tidying .*left by a start that was killed$/m)
      expect(processIdentity(service!)).not.toBe(identity)
      expect(stranger.exitCode).toBeNull()
      expect(stranger.signalCode).toBeNull()
    } finally {
      stranger.kill('SIGKILL')
    }
  })
})

describe.runIf(isRoot)('the machine', () => {
  test('refuses in one line on a full disk, and starts once there is room', async () => {
    const data = join(copy.folder, '.data')
    mkdirSync(data)
    expect(spawnSync('mount', ['-t', 'tmpfs', '-o', 'size=40m', 'tmpfs', data]).status).toBe(0)
    try {
      const refused = begin()
      expect(await exitOf(refused.child)).toBe(1)
      expect(refused.output()).toContain('The disk is full.')
      expect(refused.output()).not.toContain('    at ')
      expect(spawnSync('mount', ['-o', 'remount,size=700m', data]).status).toBe(0)
      const again = begin()
      await untilSaid(again, READY)
      await stop(again)
    } finally {
      spawnSync('umount', [data])
    }
  })

  test('leaves a service running for a user who is not root', async () => {
    expect(spawnSync('chown', ['-R', String(NOBODY), copy.folder]).status).toBe(0)
    const up = begin({ through: AS_NOBODY, env: { HOME: copy.folder } })
    await untilSaid(up, READY)
    const [database] = findProcesses(`--datadir=${join(copy.folder, '.data/mariadb')}`)
    expect(ownerOf(database!)).toBe(NOBODY)
  })

  test('answers the line that installs a program where that takes root', async () => {
    const refused = await copy.runNode(installing('dyw-absent', 'dyw-package'), AS_NOBODY)
    expect(refused.code).toBe(1)
    expect(refused.said).toContain(
      'sudo apt-get update && sudo apt-get install -y --no-install-recommends dyw-package',
    )
  })

  test('says that it waits while dpkg is locked, and installs once it is free', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'dyw-deb-'))
    const lock = spawn('perl', ['-e', HOLD_DPKG], { stdio: ['ignore', 'pipe', 'inherit'] })
    try {
      await Promise.race([once(lock.stdout, 'data'), once(lock, 'exit').then(() => expect.fail())])
      const installed = copy.runNode(installing('dyw-probe', tinyPackage(folder)))
      await until(() => installed.soFar().includes('Another package run holds the lock of dpkg'))
      lock.kill('SIGKILL')
      expect(await installed).toMatchObject({ code: 0 })
      expect(spawnSync('dyw-probe').status).toBe(0)
    } finally {
      lock.kill('SIGKILL')
      spawnSync('dpkg', ['--purge', 'dyw-probe'])
      rmSync(folder, { recursive: true })
    }
  })
})

const AS_NOBODY = ['setpriv', `--reuid=${NOBODY}`, '--clear-groups']

/** The lock as dpkg itself takes it. */
const HOLD_DPKG = `use Fcntl; $| = 1; open(F, '>>', '/var/lib/dpkg/lock-frontend') or die;
  my $lock = pack('s s l! l! i', F_WRLCK, 0, 0, 0, 0);
  fcntl(F, F_SETLK, $lock) or die; print "held\\n"; sleep 600`

function installing(program: string, debianPackage: string): string {
  return `import { ensurePrograms } from '#scripts/start/debian.mjs'
    try {
      await ensurePrograms({ programs: ['${program}'], packages: ['${debianPackage}'] })
    } catch (error) { console.log(error.message); process.exitCode = 1 }`
}

/** A package of one program that does nothing, made here: nothing is fetched. */
function tinyPackage(folder: string): string {
  const root = join(folder, 'root')
  mkdirSync(join(root, 'DEBIAN'), { recursive: true, mode: 0o755 })
  mkdirSync(join(root, 'usr/bin'), { recursive: true })
  writeFileSync(
    join(root, 'DEBIAN/control'),
    'Package: dyw-probe\nVersion: 1\nArchitecture: all\nMaintainer: x <x@example.com>\nDescription: a probe\n',
  )
  writeFileSync(join(root, 'usr/bin/dyw-probe'), '#!/bin/sh\nexit 0\n', { mode: 0o755 })
  const file = join(folder, 'dyw-probe.deb')
  expect(spawnSync('dpkg-deb', ['--build', '--root-owner-group', root, file]).status).toBe(0)
  return file
}

/** A process under a pid of our choice: the kernel is told which one it gave last. */
async function sleeperWithPid(pid: number) {
  for (let tries = 0; tries < 200; tries += 1) {
    writeFileSync('/proc/sys/kernel/ns_last_pid', String(pid - 1))
    const sleeper = spawn('sleep', ['600'], { stdio: 'ignore' })
    if (sleeper.pid === pid) return sleeper
    sleeper.kill('SIGKILL')
    await once(sleeper, 'exit')
  }
  throw new Error(`pid ${pid} was not to be had`)
}

async function killWithPrograms({ child }: Start, argument: string): Promise<void> {
  child.kill('SIGKILL')
  for (const pid of findProcesses(argument)) process.kill(pid, 'SIGKILL')
  await exitOf(child)
}

async function until(isSo: () => boolean): Promise<void> {
  while (!isSo()) await delay(5)
}

function ownerOf(pid: number): number {
  return Number(/^Uid:\s+(\d+)/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1])
}
