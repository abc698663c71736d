import { createServer, type Server } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import { createGateProcess, type GateProcess } from '#tests/support/gate-process.ts'

let pipeline: GateProcess

beforeAll(() => {
  pipeline = createGateProcess()
})
afterAll(() => pipeline?.remove())

describe('no verdict', () => {
  const servers: Server[] = []
  afterAll(() => {
    for (const server of servers) server.close()
  })

  /** A raw TCP server, so that the gate meets bytes and not a library; counts its connections. */
  const serve = async (answers: readonly (string | null)[]) => {
    let met = 0
    const server = createServer((socket) => {
      const answer = answers[Math.min(met, answers.length - 1)]
      met += 1
      socket.on('error', () => undefined)
      if (answer === null) socket.destroy()
      else socket.once('data', () => answer && socket.end(answer))
    })
    servers.push(server)
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const address = server.address()
    const port = typeof address === 'object' ? address?.port : undefined
    return { url: `http://127.0.0.1:${port}`, met: () => met }
  }
  const answer = (status: string, body = '', headers = '') =>
    `HTTP/1.1 ${status}\r\ncontent-length: ${Buffer.byteLength(body)}\r\n${headers}connection: close\r\n\r\n${body}`
  const at = (url: string, timeout = '5') =>
    pipeline.run(['gate', '--url', url, '--system', 'larkhaven', '--timeout', timeout])

  it('answers 3 where nobody listens, after a few attempts', async () => {
    const { url } = await serve([''])
    servers.pop()?.close()
    const { code, err } = await at(url, '3')
    expect(code).toBe(3)
    expect(err).toContain('ECONNREFUSED')
    expect(err.match(/Trying again/g)?.length).toBe(2)
  })

  it('answers 3 to a failure, which it does not ask for twice', async () => {
    const { url, met } = await serve([answer('500 Internal Server Error')])
    expect((await at(url)).code).toBe(3)
    expect(met()).toBe(1)
  })

  it('answers 3 where the service hangs, at the limit of time', async () => {
    const { url } = await serve([''])
    const startedAt = performance.now()
    const { code, err } = await at(url, '1')
    expect({ code, err }).toEqual({
      code: 3,
      err: expect.stringContaining('No answer in time (1 s)'),
    })
    expect(performance.now() - startedAt).toBeLessThan(10_000)
  })

  it.each([
    ['a page of another server', answer('200 OK', '<html>sign in</html>')],
    ['JSON that is no check', answer('200 OK', '{"verdict":"pass"}')],
    ['half an answer', 'HTTP/1.1 200 OK\r\ncontent-length: 999\r\n\r\n{"verdict":"pass"'],
    ['no HTTP at all', 'SSH-2.0-OpenSSH_9.2\r\n'],
    ['a redirection', answer('302 Found', '', 'location: https://example.com/\r\n')],
  ])('answers 3 to %s', async (_, bytes) => {
    const { url } = await serve([bytes])
    expect((await at(url)).code).toBe(3)
  })

  it('calls again after a broken connection, 503 and 429, and takes the verdict', async () => {
    const check = JSON.stringify({ ...createCheck.success.example, verdict: 'pass' })
    const { url, met } = await serve([
      null,
      answer('503 Service Unavailable'),
      answer('429 Too Many Requests', '', 'retry-after: 1\r\n'),
      answer('200 OK', check),
    ])
    const { code, err } = await at(url, '20')
    expect({ code, met: met() }).toEqual({ code: 0, met: 4 })
    expect(err.match(/Trying again/g)?.length).toBe(3)
  })

  it('answers 3 at once where it is asked to wait longer than it may', async () => {
    const { url, met } = await serve([answer('429 Too Many Requests', '', 'retry-after: 900\r\n')])
    expect((await at(url)).code).toBe(3)
    expect(met()).toBe(1)
  })
})
