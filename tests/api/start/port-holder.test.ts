import { type AddressInfo, createServer } from 'node:net'
import { describe, expect, test } from 'vitest'
import { freePort } from '#scripts/start/free-port.mjs'
import { requireFreePort } from '#scripts/start/port-holder.mjs'
import { readSettings } from '#scripts/start/settings.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

describe('requireFreePort', () => {
  test('refuses a taken port, naming the process and its command', async () => {
    const server = createServer()
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const { port } = server.address() as AddressInfo
    const refusal = await requireFreePort({ host: '127.0.0.1', port }).catch((error) => error)
    server.close()
    expect(refusal).toBeInstanceOf(StepFailure)
    expect(refusal.message).toContain(`Port ${port} is taken by process ${process.pid} (`)
    expect(refusal.message).toContain(`PORT=${port + 1} npm start`)
  })

  test('leaves a free port free', async () => {
    const port = await freePort()
    await requireFreePort({ host: '127.0.0.1', port })
    await requireFreePort({ host: '127.0.0.1', port })
  })
})

describe('readSettings', () => {
  test.each(['0', '65536', 'abc', '43.1', '-1'])('refuses PORT=%s', (port) => {
    expect(() => readSettings({ PORT: port })).toThrow(StepFailure)
  })

  test('answers loopback and port 4310 where nothing is said', () => {
    expect(readSettings({})).toEqual({
      host: '127.0.0.1',
      port: 4310,
      url: 'http://127.0.0.1:4310',
      production: false,
      databaseUrl: undefined,
      migrateDatabaseUrl: undefined,
    })
  })

  test('answers an address that opens where the service listens everywhere or on IPv6', () => {
    expect(readSettings({ HOST: '0.0.0.0', PORT: '80' }).url).toBe('http://127.0.0.1:80')
    expect(readSettings({ HOST: '::1', PORT: '80' }).url).toBe('http://[::1]:80')
  })
})
