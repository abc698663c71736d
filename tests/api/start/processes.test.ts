import { type ChildProcess, spawn } from 'node:child_process'
import { once } from 'node:events'
import { afterEach, describe, expect, test } from 'vitest'
import { endProcess, findOrphans, processIdentity } from '#scripts/start/processes.mjs'

const children: ChildProcess[] = []

afterEach(() => {
  for (const child of children.splice(0)) child.kill('SIGKILL')
})

describe('processIdentity', () => {
  test('answers the same for the same process, and nothing once it is gone', async () => {
    const { pid, child } = start('setInterval(() => {}, 1000)')
    const identity = processIdentity(pid)
    expect(identity).toMatch(new RegExp(`^${pid}-\\d+$`))
    expect(processIdentity(pid)).toBe(identity)
    child.kill('SIGKILL')
    await once(child, 'exit')
    expect(processIdentity(pid)).toBeUndefined()
  })
})

describe('findOrphans', () => {
  test('answers those whose owner is gone, and leaves those whose owner lives', () => {
    const own = processIdentity(process.pid)
    const owned = start('setInterval(() => {}, 1000)', { DYEWRIGHT_PROBE: own })
    const reusedPid = start('setInterval(() => {}, 1000)', {
      DYEWRIGHT_PROBE: `${process.pid}-1`,
    })
    const unmarked = start('setInterval(() => {}, 1000)')
    const found = findOrphans('DYEWRIGHT_PROBE')
    expect(found).toContain(reusedPid.pid)
    expect(found).not.toContain(owned.pid)
    expect(found).not.toContain(unmarked.pid)
    expect(findOrphans('DYEWRIGHT_PROBE', { under: '/nowhere/' })).toEqual([])
  })
})

describe('endProcess', () => {
  test('leaves no process that ignores a polite request', async () => {
    const { pid, child } = start(
      "process.on('SIGTERM', () => {}); console.log('up'); setInterval(() => {}, 1000)",
    )
    await once(child.stdout!, 'data')
    const from = Date.now()
    await endProcess(pid, { patienceMs: 300 })
    expect(Date.now() - from).toBeGreaterThanOrEqual(300)
    expect(processIdentity(pid)).toBeUndefined()
  })
})

function start(script: string, env: NodeJS.ProcessEnv = {}) {
  const child = spawn(process.execPath, ['-e', script], {
    stdio: ['ignore', 'pipe', 'inherit'],
    env: { ...process.env, ...env },
  })
  children.push(child)
  return { child, pid: child.pid! }
}
