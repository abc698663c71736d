import { createServer, type OutgoingHttpHeaders, request, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import type { RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { enclose, followEnclosing, joinEnclosing } from '#api/platform/enclosing-transaction.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { emailOf, TEST_PASSWORD } from '#tests/support/people.ts'
import { sql } from 'drizzle-orm'

/** What a client, or an enemy, might do with an Idempotency-Key; over real HTTP, fields as they are. */
let test: TestApp
let server: Server
let cookie: string

const TOKENS = '/v1/systems/larkhaven/tokens'

interface Sent {
  readonly method?: string
  readonly path?: string
  readonly headers?: OutgoingHttpHeaders
  readonly body?: unknown
}
interface Came {
  readonly status: number
  readonly headers: NodeJS.Dict<string | string[]>
  readonly text: string
  readonly body: { type?: string; errors?: { parameter?: string }[]; id?: string }
}

function send({ method = 'POST', path = TOKENS, headers = {}, body }: Sent): Promise<Came> {
  return new Promise((resolve, reject) => {
    const call = request(
      {
        host: '127.0.0.1',
        port: (server.address() as AddressInfo).port,
        method,
        path,
        headers: { cookie, 'content-type': 'application/json', ...headers },
      },
      (answer) => {
        const parts: Buffer[] = []
        answer.on('data', (part: Buffer) => parts.push(part))
        answer.on('end', () => {
          const text = Buffer.concat(parts).toString('utf8')
          const { statusCode = 0 } = answer
          resolve({
            status: statusCode,
            headers: answer.headers,
            text,
            body: JSON.parse(text || '{}'),
          })
        })
      },
    )
    call.on('error', reject)
    call.end(body === undefined ? undefined : JSON.stringify(body))
  })
}

async function signIn(): Promise<string> {
  const body = { email: emailOf('maintainer'), password: TEST_PASSWORD }
  const came = await send({ path: '/v1/sign-in', headers: { cookie: '' }, body })
  return String(came.headers['set-cookie']?.[0]).split(';')[0] ?? ''
}

const token = (name: string) => ({ name, value: '#204a5c' })
async function tokensNamed(name: string): Promise<number> {
  const { pool } = test.service.platform.database
  const [[row]] = await pool.query<(RowDataPacket & { n: number })[]>(
    'select count(*) as n from token_versions where name = ?',
    [name],
  )
  return row?.n ?? -1
}

beforeAll(async () => {
  test = await createTestApp()
  server = createServer(test.app)
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  cookie = ''
  cookie = await signIn()
})
afterAll(async () => {
  server.closeAllConnections()
  server.close()
  await test.close()
})

describe('a field that is no key', () => {
  it.each([
    ['empty', ''],
    ['quotes around nothing', '""'],
    ['256 letters', `"${'k'.repeat(256)}"`],
    ['4,000 letters', 'k'.repeat(4_000)],
    ['Latin-1', '"caf\u00e9"'],
    ['two keys', '"a", "b"'],
    ['the field twice', ['"a"', '"b"']],
    ['the same twice', ['"a"', '"a"']],
    ['a parameter', '"a";b'],
    ['half of SQL', `'); drop table tokens; --`],
  ])('refuses %s with 400, and has no effect', async (name, key) => {
    const came = await send({ headers: { 'idempotency-key': key }, body: token(`no key ${name}`) })
    expect(came.status).toBe(400)
    expect(came.body.errors?.map(({ parameter }) => parameter)).toEqual(['Idempotency-Key'])
    expect(await tokensNamed(`no key ${name}`)).toBe(0)
  })
})

describe('the same key', () => {
  it('answers once for all spellings of an address', async () => {
    const headers = { 'idempotency-key': 'spelt' }
    const first = await send({ headers, body: token('spelt') })
    const again = await send({
      headers,
      path: '/v1/systems/%6Carkhaven/tokens',
      body: token('spelt'),
    })
    expect([first.status, again.status]).toEqual([201, 201])
    expect(again.text).toBe(first.text)
  })

  it('answers once with and without quotes, and from another session of the same person', async () => {
    const first = await send({ headers: { 'idempotency-key': '"quoted"' }, body: token('quoted') })
    const headers = { 'idempotency-key': 'quoted', cookie: await signIn() }
    const again = await send({ headers, body: token('quoted') })
    expect([first.status, again.status]).toEqual([201, 201])
    expect(again.text).toBe(first.text)
    expect(await tokensNamed('quoted')).toBe(1)
  })

  it('is nothing to a method that takes none: an edit is done each time', async () => {
    await send({ body: token('edited') })
    const path = `${TOKENS}/edited`
    const texts: string[] = []
    for (const description of ['one', 'two']) {
      const etag = String((await send({ method: 'GET', path })).headers.etag)
      const headers = { 'idempotency-key': 'edit', 'if-match': etag }
      texts.push((await send({ method: 'PATCH', path, headers, body: { description } })).text)
    }
    expect(texts[1]).toContain('"two"')
    const made = await send({ headers: { 'idempotency-key': 'edit' }, body: token('after edit') })
    expect(made.status).toBe(201)
  })

  it('is another one of each caller, also of a key and its owner', async () => {
    const scopes = ['tokens:write']
    const made = await send({ path: '/v1/systems/larkhaven/keys', body: { name: 'ci', scopes } })
    const authorization = `Bearer ${JSON.parse(made.text).key}`
    const headers = { 'idempotency-key': 'both' }
    expect((await send({ headers, body: token('both') })).status).toBe(201)
    const other = await send({ headers: { ...headers, authorization }, body: token('both') })
    expect(other.body.type).toBe('/problems/token-name-taken')
  })

  it('leaves refusals of every kind unkept', async () => {
    const headers = { 'idempotency-key': 'late' }
    const refused = [
      await send({ headers, body: { name: 'late' } }),
      await send({ headers, body: token('both') }),
      await send({ headers: { ...headers, 'content-type': 'text/plain' }, body: token('late') }),
      await send({ headers, path: `${TOKENS}?colour=1`, body: token('late') }),
    ]
    expect(refused.map(({ status }) => status)).toEqual([422, 409, 415, 400])
    expect((await send({ headers, body: token('late') })).status).toBe(201)
  })

  it('has one effect, and one answer, sent 30 times at once', async () => {
    const once = { headers: { 'idempotency-key': 'burst' }, body: token('burst') }
    const came = await Promise.all(Array.from({ length: 30 }, () => send(once)))
    const running = came.filter(({ status }) => status === 409)
    for (const { body } of running) expect(body.type).toBe('/problems/idempotency-key-running')
    const made = came.filter(({ status }) => status === 201)
    expect(made.length + running.length).toBe(30)
    expect(new Set(made.map(({ text }) => text)).size).toBe(1)
    expect(await tokensNamed('burst')).toBe(1)
  })

  it('has one effect where the first answer was never heard', async () => {
    const { port } = server.address() as AddressInfo
    const headers = { cookie, 'content-type': 'application/json', 'idempotency-key': 'unheard' }
    const call = request({ port, host: '127.0.0.1', method: 'POST', path: TOKENS, headers })
    call.on('error', () => undefined)
    call.end(JSON.stringify(token('unheard')))
    await expect.poll(() => tokensNamed('unheard')).toBe(1)
    call.destroy()
    const again = () => send({ headers: { 'idempotency-key': 'unheard' }, body: token('unheard') })
    await expect.poll(async () => (await again()).status).toBe(201)
    expect(await tokensNamed('unheard')).toBe(1)
  })
})

describe('an answer larger than a row of the database', () => {
  const COLOURS = 40

  it('is answered again as it was', async () => {
    const theme = { name: 'Light', ground: 'paper', ink: 'ink' }
    await send({ body: { name: 'ink', value: '#000' } })
    await send({ body: { name: 'paper', value: '#fff' } })
    const headers = { 'if-none-match': '*' }
    const put = { method: 'PUT', path: '/v1/systems/larkhaven/themes/light', headers, body: theme }
    expect((await send(put)).status).toBe(201)
    const states = ['hover', 'active', 'focus', 'disabled']
    for (let at = 0; at < COLOURS; at += 1) {
      const value = `#${(at * 400_000).toString(16).padStart(6, '0')}`
      await send({ body: { name: `large.${'long-'.repeat(30)}${at}`, value, states } })
    }
    const name = (at: number) => `large.${'long-'.repeat(30)}${at}`
    const pairs = Array.from({ length: COLOURS }, (_, foreground) =>
      Array.from({ length: COLOURS }, (__, background) => ({ foreground, background })),
    )
      .flat()
      .filter(({ foreground, background }) => foreground !== background)
      .map((of) => ({
        foreground: name(of.foreground),
        background: name(of.background),
        use: 'text',
      }))
    const check = {
      path: '/v1/systems/larkhaven/checks?findings=all',
      headers: { 'idempotency-key': 'large' },
      body: { pairs },
    }
    const first = await send(check)
    expect(first.status).toBe(200)
    expect(Buffer.byteLength(first.text)).toBeGreaterThan(2 ** 24)
    const again = await send(check)
    expect(again.status).toBe(200)
    expect(again.text === first.text).toBe(true)
    expect(again.headers['content-encoding']).toBeUndefined()
  })
})

describe('what is begun within and outlives it', () => {
  it('is no part of the transaction that is over', async () => {
    const { db, transact } = test.service.platform.database
    const within = followEnclosing(db)
    const join = joinEnclosing(transact)
    const idOf = async () => {
      const [rows] = await within.execute<{ id: number }[]>(sql`select connection_id() as id`)
      return (rows as unknown as { id: number }[])[0]?.id
    }
    let begin = (): void => undefined
    const begun = new Promise<void>((resolve) => (begin = resolve))
    let outliving: Promise<void> = Promise.resolve()
    const enclosed = await enclose(transact, async (tx) => {
      outliving = begun.then(() => join(async (own) => expect(own).not.toBe(tx)))
      expect(await join(async (own) => own === tx)).toBe(true)
      return idOf()
    })
    expect(enclosed).toBeGreaterThan(0)
    begin()
    await outliving
  })
})
