import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { existsSync } from 'node:fs'
import { dirname } from 'node:path'
import { createConnection } from 'mysql2/promise'
import { describe, expect, inject, test } from 'vitest'
import { processIdentity } from '#scripts/start/processes.mjs'
import { ROOT } from '#scripts/start/project.mjs'
import { reapLeftovers } from '#scripts/start/throw-away.mjs'

const RUN = `
  import { spawn } from 'node:child_process'
  import { startThrowAwayMariadb } from '#scripts/start/throw-away.mjs'
  const { pid, asRoot } = await startThrowAwayMariadb()
  const helper = spawn('sleep', ['600'], { detached: true, stdio: 'ignore' })
  const [folder, socket] = (await asRoot('select @@datadir, @@socket')).trim().split('\\t')
  console.log(JSON.stringify({ pids: [pid, helper.pid], folder, socket }))`

describe('reapLeftovers', () => {
  test('leaves nothing of a run that was killed, and everything of a run that lives', async () => {
    const killed = spawn(process.execPath, ['--input-type=module', '-e', RUN], {
      cwd: ROOT,
      stdio: ['ignore', 'pipe', 'inherit'],
    })
    const [said] = await once(killed.stdout, 'data')
    const { pids, folder, socket } = JSON.parse(String(said)) as {
      pids: number[]
      folder: string
      socket: string
    }
    await reapLeftovers()
    for (const pid of pids) expect(processIdentity(pid)).toBeDefined()
    expect(existsSync(folder)).toBe(true)
    expect(existsSync(socket)).toBe(true)

    killed.kill('SIGKILL')
    await once(killed, 'exit')
    await reapLeftovers()
    for (const pid of pids) expect(processIdentity(pid)).toBeUndefined()
    expect(existsSync(dirname(folder))).toBe(false)
    expect(existsSync(dirname(socket))).toBe(false)

    const own = await createConnection(inject('database').adminUrl)
    await own.query('select 1')
    await own.end()
  })
})
