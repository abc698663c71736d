import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp({ env: { PUBLIC_URL: 'http://127.0.0.1:4310' } })
})
afterAll(() => test.close())

type Fields = Readonly<Record<string, string>>
const HOST = { Host: '127.0.0.1:4310' }

const foreign: [string, Fields][] = [
  ['another site', { 'Sec-Fetch-Site': 'cross-site' }],
  ['another port of this host', { 'Sec-Fetch-Site': 'same-site' }],
  ['no page at all', { 'Sec-Fetch-Site': 'none' }],
  ['a word nobody knows', { 'Sec-Fetch-Site': 'same-origin, cross-site' }],
  [
    'another site that claims our Origin',
    {
      'Sec-Fetch-Site': 'cross-site',
      Origin: 'http://127.0.0.1:4310',
    },
  ],
  ['an old browser on another site', { Origin: 'https://attacker.example' }],
  ['an old browser on another port', { Origin: 'http://127.0.0.1:9999' }],
  ['an old browser by another scheme', { Origin: 'https://127.0.0.1:4310' }],
  ['an old browser on another name of the machine', { Origin: 'http://localhost:4310' }],
  ['a sandboxed page', { Origin: 'null' }],
  ['a name that begins like ours', { Origin: 'http://127.0.0.1:4310.attacker.example' }],
  ['an empty Origin', { Origin: '' }],
]
const own: [string, Fields][] = [
  ['our own page', { 'Sec-Fetch-Site': 'same-origin' }],
  [
    'our own page with its Origin',
    {
      'Sec-Fetch-Site': 'same-origin',
      Origin: 'http://127.0.0.1:4310',
    },
  ],
  ['an old browser on our own page', { Origin: 'http://127.0.0.1:4310' }],
  ['what is no browser', {}],
]

describe('with a session', () => {
  it.each(foreign)('refuses a write from %s', async (_, fields) => {
    const { body } = await test.people.maintainer
      .post('/v1/systems/larkhaven/keys')
      .set({ ...HOST, ...fields })
      .send({ name: 'x', scopes: ['checks:write'] })
      .expect(403)
    expect(body.type).toBe('/problems/origin-foreign')
  })

  it('leaves no key behind after all of them', async () => {
    const { body } = await test.people.maintainer.get('/v1/systems/larkhaven/keys').expect(200)
    expect(body.items).toEqual([])
  })

  it.each(own)('takes a write from %s', async (_, fields) => {
    await test.people.maintainer
      .post('/v1/systems/larkhaven/keys')
      .set({ ...HOST, ...fields })
      .send({ name: 'x', scopes: ['checks:write'] })
      .expect(201)
  })

  it('refuses a form, whatever page sent it', async () => {
    await test.people.maintainer
      .post('/v1/systems/larkhaven/keys')
      .set({ ...HOST, 'Sec-Fetch-Site': 'cross-site' })
      .type('form')
      .send('name=x')
      .expect(403)
    await test.people.maintainer
      .post('/v1/systems/larkhaven/keys')
      .set(HOST)
      .type('text/plain')
      .send('{"name":"x"}')
      .expect(415)
  })

  it('answers a read from anywhere: its page cannot look at it', async () => {
    await test.people.maintainer
      .get('/v1/me')
      .set({ ...HOST, 'Sec-Fetch-Site': 'cross-site' })
      .expect(200)
      .expect((answer) => expect(answer.headers['access-control-allow-origin']).toBeUndefined())
  })
})

describe('signing in', () => {
  const credentials = { email: emailOf('engineer'), password: TEST_PASSWORD }

  it.each(foreign)('refuses it from %s', async (_, fields) => {
    const { headers } = await test.anonymous
      .post('/v1/sign-in')
      .set({ ...HOST, ...fields })
      .send(credentials)
      .expect(403)
    expect(headers['set-cookie']).toBeUndefined()
  })
})

describe('host', () => {
  it.each([
    'attacker.example',
    '127.0.0.1.attacker.example',
    'localhost.attacker.example',
    '0.0.0.0',
  ])('refuses %s with 400', async (host) => {
    const { body } = await test.anonymous.get('/healthz').set('Host', host).expect(400)
    expect(body.type).toBe('/problems/host-unknown')
  })

  it.each(['127.0.0.1', 'localhost:1234', '[::1]:4310', '127.8.9.1'])(
    'answers to %s',
    async (host) => {
      await test.anonymous.get('/healthz').set('Host', host).expect(200)
    },
  )
})
