import { createServer, request, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

/**
 * Token names are anything a path can be made of, and most of what it cannot. Addresses go over the wire exactly as
 * they are written here: RFC 3986, 2.1 (percent-encoding), 2.4 (decoded once), 5.2.4 (dot segments).
 */
let test: TestApp
let server: Server
let cookie = ''

interface Came {
  readonly status: number
  readonly headers: NodeJS.Dict<string | string[]>
  // biome-ignore lint/suspicious/noExplicitAny: bodies of many operations are read here
  readonly body: any
}

function send(
  method: string,
  path: string,
  { etag, body }: { etag?: string; body?: unknown } = {},
) {
  return new Promise<Came>((resolve, reject) => {
    const headers = {
      cookie,
      ...(body === undefined ? {} : { 'content-type': 'application/json' }),
      ...(etag === undefined ? {} : { 'if-match': etag }),
    }
    const { port } = server.address() as AddressInfo
    const call = request({ host: '127.0.0.1', port, method, path, headers }, (answer) => {
      let text = ''
      answer.setEncoding('utf8')
      answer.on('data', (part: string) => (text += part))
      answer.on('end', () =>
        resolve({
          status: answer.statusCode ?? 0,
          headers: answer.headers,
          body: JSON.parse(text || '{}'),
        }),
      )
    })
    call.on('error', reject)
    call.end(body === undefined ? undefined : JSON.stringify(body))
  })
}

beforeAll(async () => {
  test = await createTestApp()
  server = createServer(test.app)
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const body = { email: emailOf('admin'), password: TEST_PASSWORD }
  const { headers } = await send('POST', '/v1/sign-in', { body })
  cookie = String(headers['set-cookie']?.[0]).split(';')[0] ?? ''
  await send('POST', TOKENS, { body: { name: 'paper', value: '#fff' } })
})
afterAll(async () => {
  server.closeAllConnections()
  server.close()
  await test.close()
})

const SYSTEM = '/v1/systems/larkhaven'
const TOKENS = `${SYSTEM}/tokens`

/** Every byte encoded, in small hexadecimal digits. */
const everyByte = (text: string): string =>
  [...Buffer.from(text, 'utf8')].map((byte) => `%${byte.toString(16).padStart(2, '0')}`).join('')
/** No more than what would end or split the segment, or is no ASCII. */
const leastBytes = (text: string): string =>
  encodeURIComponent(text).replace(/%(?:2B|3A|3B|3D|40|24|26|2C)/g, (code) =>
    decodeURIComponent(code),
  )

const NAMES = [
  'plain',
  'dots.in.a.row',
  'two words.with space',
  ' space before and after ',
  'a/b',
  '/',
  '//',
  '100%',
  '%',
  '%2F',
  '%2e%2e',
  '%25',
  '%zz',
  'a+b',
  'a?b=c',
  'a#b',
  'a&b=c',
  'a;b,c:d@e!f*g(h)i',
  `quotes'and"others\``,
  '<script>alert(1)</script>',
  'näh/ß/å',
  '色.朱',
  'שלום',
  '🎨',
  '👩‍🎨.🏳️‍🌈',
  'e\u0301',
  'constructor',
  '__proto__',
  'tokens',
  'light.css',
  'a$b',
  `${'long '.repeat(50)}end`,
  '🚢'.repeat(120),
]

describe.each(NAMES.map((name) => [name]))('the token %j', (name) => {
  it('is made, found, edited, paired, listed and removed by its address', async () => {
    const made = await send('POST', TOKENS, { body: { name, value: '#204a5c' } })
    expect(made.status).toBe(201)
    const kept: string = made.body.name
    const location = String(made.headers.location)
    expect(location.slice(TOKENS.length + 1)).not.toMatch(/[/?#\s]/)
    for (const spelt of [
      location,
      `${TOKENS}/${everyByte(kept)}`,
      `${TOKENS}/${leastBytes(kept)}`,
    ]) {
      const { status, body } = await send('GET', spelt)
      expect([status, body.id, body.name]).toEqual([200, made.body.id, kept])
    }
    const etag = String((await send('GET', location)).headers.etag)
    const edited = await send('PATCH', location, { etag, body: { description: 'edited' } })
    expect([edited.status, edited.body.token?.name ?? edited.body.name]).toEqual([200, kept])

    const listed = await send('GET', `${TOKENS}?named=${encodeURIComponent(kept)}`)
    expect(listed.body.items.map((item: { name: string }) => item.name)).toContain(kept)
    const group = kept.split('.')[0] ?? ''
    const grouped = await send('GET', `${TOKENS}?group=${everyByte(group)}`)
    expect(grouped.body.items.map((item: { name: string }) => item.name)).toContain(kept)

    const alias = await send('POST', TOKENS, { body: { name: 'alias', value: `{${kept}}` } })
    expect(alias.body.value).toBe(`{${kept}}`)
    const pair = { foreground: kept, background: 'paper', use: 'text' }
    const paired = await send('POST', `${SYSTEM}/pairs`, { body: pair })
    expect([paired.status, paired.body.foreground]).toEqual([201, kept])
    await remove(String(paired.headers.location))
    await remove(`${TOKENS}/alias`)
    await remove(location)
    expect((await send('GET', location)).status).toBe(404)
  })
})

async function remove(path: string): Promise<void> {
  const etag = String((await send('GET', path)).headers.etag)
  expect((await send('DELETE', path, { etag })).status).toBe(204)
}

describe('what cannot be a name', () => {
  it.each([
    '',
    '.',
    '..',
    'a.',
    '.a',
    'a..b',
    '$root',
    '{a}',
    'tab\t',
    'nul\u0000',
    'state-hover.a',
  ])('refuses to make %j with 422', async (name) => {
    const { status, body } = await send('POST', TOKENS, { body: { name, value: '#204a5c' } })
    expect([status, body.errors?.[0]?.pointer]).toEqual([422, '/name'])
  })

  it.each([
    '.',
    '..',
    '%2e',
    '%2E%2E',
    'a%2F..%2Fb',
    '..%2f..%2fmembers',
    'a.',
    'a%2E',
    'a..b',
    '%24root',
    '%7Ba%7D',
    '%09',
    '%00',
  ])('refuses to read %s: nothing is there, nor anywhere above', async (segment) => {
    const { status, body } = await send('GET', `${TOKENS}/${segment}`)
    expect([400, 404]).toContain(status)
    expect(body.items).toBeUndefined()
    expect(body.key).toBeUndefined()
  })

  it.each(['%', '%2', '%zz', '%c3%28', '%ff', '%ed%a0%80'])(
    'refuses the broken encoding %s with 400',
    async (segment) => {
      expect((await send('GET', `${TOKENS}/${segment}`)).status).toBe(400)
      expect((await send('GET', `${TOKENS}?named=${segment}`)).status).toBe(400)
    },
  )

  it('leaves a slash that is not encoded as the end of the name', async () => {
    expect((await send('GET', `${TOKENS}/a/b`)).status).toBe(404)
    expect((await send('GET', `${TOKENS}/plain/`)).status).toBe(404)
  })
})
