import { createConnection, type RowDataPacket } from 'mysql2/promise'
import supertest from 'supertest'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { compose, type Service } from '#api/compose.ts'
import { createRateCounter, type RateCounter } from '#api/platform/rate-limit/rate-counter.ts'
import { newApiKey } from '#api/platform/secrets.ts'
import { createTestApp, type TestApp, testConfig } from '#tests/support/app.ts'
import { type Agent, createAgent, emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

/** The fields of draft-ietf-httpapi-ratelimit-headers; the budgets are this service's own. */
let test: TestApp
let counted: string[] = []
const open: Service[] = []

beforeAll(async () => {
  test = await createTestApp()
  await test.createSystem('elsewhere')
})
afterAll(async () => {
  await Promise.all(open.map((service) => service.close()))
  await test.close()
})
beforeEach(async () => {
  counted = []
  await forgetCounts()
})

const forgetCounts = () => test.service.platform.database.pool.query('delete from rate_counters')

const loud = (counter: RateCounter): RateCounter => ({
  add: (bucket, hits, windowMs) => {
    counted.push(`${bucket.split(':').slice(0, 2).join(':')} ${hits}`)
    return counter.add(bucket, hits, windowMs)
  },
})

/** The same data behind small budgets, and who has a session there already. */
function limited(env: Readonly<Record<string, string>>, rateCounter?: RateCounter): Service {
  const config = testConfig(test.database.serveUrl, { RATE_WINDOW_SECONDS: '600', ...env })
  const counter = rateCounter ?? createRateCounter(test.service.platform.database)
  const service = compose({ config, platform: { rateCounter: loud(counter) } })
  open.push(service)
  return service
}

async function signedIn({ app }: Service): Promise<Agent> {
  const agent = createAgent(app)
  const body = { email: emailOf('maintainer'), password: TEST_PASSWORD }
  await agent.post('/v1/sign-in').send(body).expect(200)
  return agent
}

async function keyOf(system = 'larkhaven'): Promise<string> {
  const { body } = await test.people.maintainer
    .post(`/v1/systems/${system}/keys`)
    .send({ name: 'pipeline', scopes: ['themes:read'] })
    .expect(201)
  return body.key
}

const statusesOf = async (send: () => Promise<{ status: number }>, times: number) => {
  const statuses: number[] = []
  for (let sent = 0; sent < times; sent += 1) statuses.push((await send()).status)
  return statuses
}

describe('over its budget', () => {
  it('refuses an address with 429, RateLimit and Retry-After', async () => {
    const agent = await signedIn(limited({ RATE_CALLS_PER_ADDRESS: '3' }))
    expect(await statusesOf(() => agent.get('/v1/me'), 2)).toEqual([200, 200])
    const { body, headers } = await agent.get('/v1/me').expect(429)
    expect(body).toMatchObject({ type: '/problems/rate-limited', status: 429 })
    expect(body.detail).toContain('this address')
    expect(Number(headers['retry-after'])).toBeGreaterThan(0)
    expect(Number(headers['retry-after'])).toBeLessThanOrEqual(600)
    expect(headers.ratelimit).toMatch(/^"address"; r=0; t=\d+$/)
    expect(headers['ratelimit-policy']).toMatch(/^"address"; q=3; w=600; pk=:[\w+/=]+:$/)
  })

  it('refuses a key, and leaves another key of the same system alone', async () => {
    const service = limited({ RATE_CALLS_PER_KEY: '2' })
    const [spent, fresh] = [await keyOf(), await keyOf()].map((key) =>
      createAgent(service.app, key),
    )
    expect(await statusesOf(() => (spent as Agent).get('/v1/systems/larkhaven'), 3)).toEqual([
      200, 200, 429,
    ])
    const { headers } = await (fresh as Agent).get('/v1/systems/larkhaven').expect(200)
    expect(headers.ratelimit).toMatch(
      /^"address"; r=\d+; t=\d+, "key"; r=1; t=\d+, "system"; r=\d+; t=\d+$/,
    )
  })

  it('refuses a system to everybody, and leaves another system alone', async () => {
    const key = await keyOf()
    await forgetCounts()
    const service = limited({ RATE_CALLS_PER_SYSTEM: '2' })
    const agent = await signedIn(service)
    const byKey = createAgent(service.app, key)
    await agent.get('/v1/systems/larkhaven').expect(200)
    await byKey.get('/v1/systems/larkhaven/tokens').expect(200)
    const { body } = await agent.get('/v1/systems/larkhaven').expect(429)
    expect(body.detail).toContain('this system')
    await agent.get('/v1/systems/elsewhere').expect(200)
  })

  it('leaves the budget of a system alone where a stranger asks', async () => {
    const service = limited({ RATE_CALLS_PER_SYSTEM: '1' })
    const agent = await signedIn(service)
    const stranger = createAgent(service.app, await keyOf('elsewhere'))
    expect(await statusesOf(() => stranger.get('/v1/systems/larkhaven'), 3)).toEqual([
      404, 404, 404,
    ])
    await agent.get('/v1/systems/larkhaven').expect(200)
  })

  it('refuses before a body is read, and has no effect', async () => {
    const agent = await signedIn(limited({ RATE_CALLS_PER_SYSTEM: '1' }))
    await agent.get('/v1/systems/larkhaven').expect(200)
    const token = { name: 'never.made', value: '#204a5c' }
    await agent.post('/v1/systems/larkhaven/tokens').send(token).expect(429)
    await test.people.maintainer.get('/v1/systems/larkhaven/tokens/never.made').expect(404)
  })

  it('refuses without a statement once it is told that the budget is spent', async () => {
    const agent = await signedIn(limited({ RATE_CALLS_PER_ADDRESS: '2' }))
    await agent.get('/v1/me').expect(200)
    expect(counted).toHaveLength(2)
    expect(await statusesOf(() => agent.get('/v1/me'), 5)).toEqual([429, 429, 429, 429, 429])
    expect(counted).toHaveLength(2)
  })

  it('answers again once the database says that the window is over', async () => {
    const env = { RATE_CALLS_PER_ADDRESS: '2' }
    const first = await signedIn(limited(env))
    await first.get('/v1/me').expect(200)
    await first.get('/v1/me').expect(429)
    const { pool } = test.service.platform.database
    await pool.query('update rate_counters set window_ends_at = utc_timestamp(3)')
    await (await signedIn(limited(env))).get('/v1/me').expect(200)
  })

  it('leaves health checks out', async () => {
    const { app } = limited({ RATE_CALLS_PER_ADDRESS: '1' })
    const agent = createAgent(app)
    expect(await statusesOf(() => agent.get('/healthz'), 3)).toEqual([200, 200, 200])
    expect(counted).toEqual([])
  })
})

describe('an address', () => {
  const ask = (app: Service['app'], forwarded: string) =>
    supertest(app).post('/v1/sign-in').set('X-Forwarded-For', forwarded).send({})

  it('is the one that the connection has, whatever X-Forwarded-For says', async () => {
    const { app } = limited({ RATE_CALLS_PER_ADDRESS: '2' })
    const forged = ['203.0.113.1', '203.0.113.2', '203.0.113.3', '203.0.113.4, 203.0.113.5']
    const statuses: number[] = []
    for (const one of forged) statuses.push((await ask(app, one)).status)
    expect(statuses).toEqual([422, 422, 429, 429])
  })

  it('is the last that a trusted proxy names: what was forged before it gains nothing', async () => {
    const { app } = limited({ RATE_CALLS_PER_ADDRESS: '1', TRUSTED_PROXIES: '1' })
    const statuses: number[] = []
    for (const forged of ['1.1.1.1', '2.2.2.2', 'no address']) {
      statuses.push((await ask(app, `${forged}, 203.0.113.9`)).status)
    }
    expect(statuses).toEqual([422, 429, 429])
    expect((await ask(app, '203.0.113.9, 203.0.113.10')).status).toBe(422)
  })

  it('is a /56 network where it is IPv6, and one for all that is no address', async () => {
    const { app } = limited({ RATE_CALLS_PER_ADDRESS: '1', TRUSTED_PROXIES: '1' })
    const statuses: number[] = []
    const sent = [
      '2001:db8:0:10::1',
      '2001:db8:0:1f::2',
      '2001:db8:0:100::1',
      'x',
      `${'y'.repeat(300)}`,
    ]
    for (const one of sent) statuses.push((await ask(app, one)).status)
    expect(statuses).toEqual([422, 429, 422, 422, 429])
  })
})

describe('what costs no query', () => {
  it('is a theme list or file but for each twentieth of the budget', async () => {
    const service = limited({
      RATE_READS_PER_ADDRESS: '2000',
      RATE_READS_PER_KEY: '100',
      RATE_READS_PER_SYSTEM: '2000',
    })
    const agent = createAgent(service.app, await keyOf())
    const send = () => agent.get('/v1/systems/larkhaven/themes')
    const statuses = await statusesOf(send, 103)
    expect(statuses.filter((status) => status === 200)).toHaveLength(100)
    expect(statuses.slice(100)).toEqual([429, 429, 429])
    expect(counted.filter((one) => one === 'theme-reads:key 5')).toHaveLength(20)
    expect(counted.filter((one) => one === 'theme-reads:address 100')).toHaveLength(2)
    expect(counted.filter((one) => one === 'theme-reads:system 100')).toHaveLength(1)
    expect(counted.filter((one) => one.startsWith('calls'))).toEqual([])
  })

  it('is a request without credentials, or with a key that is mistyped', async () => {
    const { app } = limited({ RATE_CALLS_PER_ADDRESS: '1' })
    const mistyped = createAgent(app, `${newApiKey('ci').slice(0, -1)}l`)
    expect(await statusesOf(() => mistyped.get('/v1/me'), 3)).toEqual([401, 401, 401])
    expect(await statusesOf(() => createAgent(app).get('/v1/me'), 3)).toEqual([401, 401, 401])
    expect(counted).toEqual([])
  })

  it('is what comes while the counter is asked: the next statement counts them all', async () => {
    const { app } = limited({ RATE_CALLS_PER_KEY: '40' })
    const agent = createAgent(app, await keyOf())
    const send = () => agent.get('/v1/systems/larkhaven')
    const answers = await Promise.all(Array.from({ length: 60 }, send))
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(40)
    const sizes = counted
      .filter((one) => one.startsWith('calls:key'))
      .map((one) => Number(one.split(' ')[1]))
    expect(sizes.reduce((sum, size) => sum + size, 0)).toBeGreaterThanOrEqual(40)
    expect(sizes.length).toBeLessThan(60)
  })
})

describe('while the counter cannot be reached', () => {
  const away: RateCounter = {
    add: () => Promise.reject(Object.assign(new Error('gone'), { code: 'ECONNREFUSED' })),
  }

  it('refuses calls with 503 and Retry-After', async () => {
    const agent = createAgent(limited({}, away).app, await keyOf())
    const { body, headers } = await agent.get('/v1/me').expect(503)
    expect(body.type).toBe('/problems/service-unavailable')
    expect(Number(headers['retry-after'])).toBeGreaterThan(0)
  })

  it('answers theme reads', async () => {
    const agent = createAgent(limited({}, away).app, await keyOf())
    await agent.get('/v1/systems/larkhaven/themes').expect(200)
  })
})

describe('the counter', () => {
  it('counts 300 hits at once as 300, by the database’s clock', async () => {
    const counter = createRateCounter(test.service.platform.database)
    const all = await Promise.all(Array.from({ length: 300 }, () => counter.add('b', 1, 60_000)))
    const hits = all.map((one) => one.hits).sort((a, b) => a - b)
    expect(hits).toEqual(Array.from({ length: 300 }, (_, at) => at + 1))
    for (const { remainingMs } of all) expect(remainingMs).toBeLessThanOrEqual(60_000)
    const admin = await createConnection(test.database.adminUrl)
    await admin.query(
      "update rate_counters set window_ends_at = utc_timestamp(3) where bucket = 'b'",
    )
    await admin.end()
    expect((await counter.add('b', 7, 60_000)).hits).toBe(7)
  })

  it('answers so many hits and so much time as a number holds', async () => {
    const counter = createRateCounter(test.service.platform.database)
    await counter.add('large', 400_000_000, 3_600_000)
    const { hits, remainingMs } = await counter.add('large', 100_000_000, 3_600_000)
    expect(hits).toBe(500_000_000)
    expect(remainingMs).toBeGreaterThan(3_500_000)
    expect(remainingMs).toBeLessThanOrEqual(3_600_000)
  })

  it('clears old buckets away', async () => {
    const { pool } = test.service.platform.database
    const counter = createRateCounter(test.service.platform.database)
    for (let at = 0; at < 50; at += 1) await counter.add(`old-${at}`, 1, 60_000)
    await pool.query("update rate_counters set window_ends_at = '2026-01-01 00:00:00'")
    for (let at = 0; at < 3; at += 1) await counter.add(`new-${at}`, 1, 60_000)
    const [rows] = await pool.query<(RowDataPacket & { bucket: string })[]>(
      'select bucket from rate_counters order by bucket',
    )
    expect(rows.map(({ bucket }) => bucket)).toEqual(['new-0', 'new-1', 'new-2'])
  })
})
