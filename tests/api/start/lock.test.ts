import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { describe, expect, test } from 'vitest'
import { holdLock } from '#scripts/start/lock.mjs'
import { ROOT } from '#scripts/start/project.mjs'

const HOLD = `
  const { holdLock } = await import('#scripts/start/lock.mjs')
  const { holder } = await holdLock(process.argv[1])
  console.log(holder ?? 'taken')
  setInterval(() => {}, 1000)`

describe('holdLock', () => {
  test('answers the holder while it lives, and is free the moment it is killed', async () => {
    const name = `probe-${process.pid}`
    const child = spawn(process.execPath, ['--input-type=module', '-e', HOLD, name], {
      cwd: ROOT,
      stdio: ['ignore', 'pipe', 'inherit'],
    })
    const [said] = await once(child.stdout, 'data')
    expect(String(said).trim()).toBe('taken')
    expect(await holdLock(name)).toMatchObject({ holder: child.pid })
    child.kill('SIGKILL')
    await once(child, 'exit')
    const lock = await holdLock(name)
    expect(lock.holder).toBeUndefined()
    lock.release()
  })
})
