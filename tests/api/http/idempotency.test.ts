import { createHash } from 'node:crypto'
import { createConnection, type PoolConnection, type RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent } from '#tests/support/people.ts'

/** draft-ietf-httpapi-idempotency-key-header; what is kept and for how long is this service's own. */
let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
  await test.createSystem('elsewhere')
})
afterAll(() => test.close())

const TOKENS = '/v1/systems/larkhaven/tokens'
const KEYS = '/v1/systems/larkhaven/keys'

interface Sent {
  readonly key: string
  readonly body: object
  readonly path?: string
}

const post = (agent: Agent, { key, body, path = TOKENS }: Sent) =>
  agent.post(path).set('Idempotency-Key', `"${key}"`).send(body)

async function countOf(statement: string, value: string): Promise<number> {
  const [[row]] = await test.service.platform.database.pool.query<
    (RowDataPacket & { n: number })[]
  >(statement, [value])
  return row?.n ?? -1
}
const tokensNamed = (name: string) =>
  countOf('select count(*) as n from token_versions where name = ?', name)
const keysNamed = (name: string) =>
  countOf('select count(*) as n from api_keys where name = ?', name)
const recordsHolding = (text: string) =>
  countOf('select count(*) as n from idempotency_records where body like ?', `%${text}%`)

const token = (name: string) => ({ name, value: '#204a5c' })

describe('a POST with an Idempotency-Key', () => {
  it('answers a repetition as the first time and has no second effect', async () => {
    const sent = { key: 'same', body: token('same') }
    const first = await post(test.people.maintainer, sent).expect(201)
    const again = await post(test.people.maintainer, sent).expect(201)
    expect(again.text).toBe(first.text)
    for (const name of ['location', 'etag', 'content-type']) {
      expect(again.headers[name]).toBe(first.headers[name])
    }
    expect(await tokensNamed('same')).toBe(1)
    await test.people.maintainer.get(String(first.headers.location)).expect(200)
  })

  it('answers the repetition also where the bodies differ in spelling only', async () => {
    const key = 'spelling'
    await post(test.people.maintainer, { key, body: { name: key, value: '#fff' } }).expect(201)
    await post(test.people.maintainer, { key, body: { value: '#fff', name: key } }).expect(201)
    expect(await tokensNamed(key)).toBe(1)
  })

  it('refuses another body with the same key', async () => {
    await post(test.people.maintainer, { key: 'other', body: token('other') }).expect(201)
    const refused = await post(test.people.maintainer, { key: 'other', body: token('changed') })
    expect(refused.status).toBe(422)
    expect(refused.body).toMatchObject({
      type: '/problems/idempotency-key-reused',
      errors: [{ parameter: 'Idempotency-Key' }],
    })
    expect(await tokensNamed('changed')).toBe(0)
  })

  it('refuses a key that cannot be read', async () => {
    const refused = await test.people.maintainer
      .post(TOKENS)
      .set('Idempotency-Key', '"unclosed')
      .send(token('unclosed'))
      .expect(400)
    expect(refused.body.errors[0].parameter).toBe('Idempotency-Key')
    expect(await tokensNamed('unclosed')).toBe(0)
  })

  it('leaves a refusal unkept: the same key can succeed later', async () => {
    await test.people.maintainer.post(TOKENS).send(token('taken')).expect(201)
    const refused = await post(test.people.maintainer, { key: 'free', body: token('taken') })
    expect(refused.body.type).toBe('/problems/token-name-taken')
    await post(test.people.maintainer, { key: 'free', body: token('free') }).expect(201)
  })

  it('answers each caller, and each address, for itself', async () => {
    const sent = { key: 'shared', body: { name: 'own key', scopes: ['themes:read'] }, path: KEYS }
    const ids = [
      await post(test.people.maintainer, sent).expect(201),
      await post(test.people.otherMaintainer, sent).expect(201),
      await post(test.people.maintainer, { ...sent, path: '/v1/systems/elsewhere/keys' }),
    ].map(({ body }) => body.id)
    expect(new Set(ids).size).toBe(3)
    expect(await keysNamed('own key')).toBe(3)
  })

  it('answers a repetition without the secret that is shown once', async () => {
    const body = { name: 'shown once', scopes: ['themes:read'] }
    const first = await post(test.people.maintainer, { key: 'secret', body, path: KEYS })
    const again = await post(test.people.maintainer, { key: 'secret', body, path: KEYS })
    const { key, ...rest } = first.body
    expect(key).toMatch(/^dyw_read_/)
    expect(again.status).toBe(201)
    expect(again.body).toEqual(rest)
    expect(await recordsHolding('shown once')).toBe(1)
    expect(await recordsHolding(key)).toBe(0)
  })

  it('answers a check in the type it was asked in, and refuses another type', async () => {
    const check = { key: 'form', body: {}, path: '/v1/systems/larkhaven/checks' }
    const ask = () => post(test.people.maintainer, check).set('Accept', 'application/sarif+json')
    const first = await ask().expect(200)
    const again = await ask().expect(200)
    expect(again.headers['content-type']).toContain('application/sarif+json')
    expect(again.text).toBe(first.text)
    await post(test.people.maintainer, check).set('Accept', 'application/json').expect(422)
  })

  it('refuses whoever has lost the right meanwhile', async () => {
    const { body } = await test.people.maintainer
      .post(KEYS)
      .send({ name: 'short', scopes: ['checks:write'] })
      .expect(201)
    const check = { key: 'lost', body: {}, path: '/v1/systems/larkhaven/checks' }
    await post(test.withKey(body.key), check).expect(200)
    await test.people.maintainer.delete(`${KEYS}/${body.id}`).expect(204)
    await post(test.withKey(body.key), check).expect(401)
  })

  it('answers the first anew once 24 hours are over, and clears old records away', async () => {
    const sent = { key: 'old', body: { name: 'old', scopes: ['themes:read'] }, path: KEYS }
    await post(test.people.maintainer, sent).expect(201)
    const { pool } = test.service.platform.database
    const [[row]] = await pool.query<(RowDataPacket & { hours: number })[]>(
      `select round(timestampdiff(second, utc_timestamp(3), expires_at) / 3600) as hours
         from idempotency_records where body like '%"name":"old"%'`,
    )
    expect(Number(row?.hours)).toBe(24)
    await pool.query('update idempotency_records set expires_at = utc_timestamp(3)')
    await post(test.people.maintainer, sent).expect(201)
    expect(await keysNamed('old')).toBe(2)
    expect(await countOf('select count(*) as n from idempotency_records where 1 = ?', '1')).toBe(1)
  })

  it('answers a system, a pair and a sign-out too', async () => {
    const system = { key: 'quay', body: { key: 'quay', name: 'Quay' }, path: '/v1/systems' }
    const first = await post(test.people.admin, system).expect(201)
    expect((await post(test.people.admin, system).expect(201)).text).toBe(first.text)
    await test.people.maintainer.post(TOKENS).send(token('ink')).expect(201)
    await test.people.maintainer.post(TOKENS).send({ name: 'ground', value: '#fff' }).expect(201)
    const pair = {
      key: 'pair',
      body: { foreground: 'ink', background: 'ground', use: 'text' },
      path: '/v1/systems/larkhaven/pairs',
    }
    const declared = await post(test.people.maintainer, pair).expect(201)
    expect((await post(test.people.maintainer, pair).expect(201)).text).toBe(declared.text)
    await post(test.people.stranger, { key: 'out', body: {}, path: '/v1/sign-out' }).expect(204)
  })
})

describe('while the first request still runs', () => {
  it('refuses the same key with 409 and Retry-After', async () => {
    const user = await userIdOf('maintainer@quay.test')
    const name = JSON.stringify(['user', user, 'POST', TOKENS, 'busy'])
    const keyHash = createHash('sha256').update(name).digest('hex')
    const elsewhere = await test.service.platform.database.pool.getConnection()
    await lock(elsewhere, keyHash)
    const sent = { key: 'busy', body: token('busy') }
    const refused = await post(test.people.maintainer, sent).expect(409)
    expect(refused.body.type).toBe('/problems/idempotency-key-running')
    expect(refused.headers['retry-after']).toBe('1')
    expect(await tokensNamed('busy')).toBe(0)
    elsewhere.destroy()
    await expect
      .poll(async () => (await post(test.people.maintainer, sent)).status, { timeout: 2_000 })
      .toBe(201)
  })

  const userIdOf = async (email: string): Promise<string> => {
    const [[row]] = await test.service.platform.database.pool.query<
      (RowDataPacket & { id: string })[]
    >('select id from users where email = ?', [email])
    return row?.id ?? ''
  }
  const lock = (connection: PoolConnection, keyHash: string) =>
    connection.query('select get_lock(sha2(concat(database(), ?), 256), 0)', [keyHash])
})

describe('when its record cannot be written', () => {
  it('leaves no effect, and the head as it was', async () => {
    const admin = await createConnection(test.database.adminUrl)
    await admin.query(`create trigger refuse_record before insert on idempotency_records for each row
      signal sqlstate '45000' set message_text = 'no record'`)
    await post(test.people.maintainer, { key: 'lone', body: token('lone') }).expect(500)
    await admin.query('drop trigger refuse_record')
    await admin.end()
    expect(await tokensNamed('lone')).toBe(0)
    await test.people.maintainer.get(`${TOKENS}/lone`).expect(404)
    await post(test.people.maintainer, { key: 'lone', body: token('lone') }).expect(201)
    await test.people.maintainer.get(`${TOKENS}/lone`).expect(200)
  })
})

it('takes a key on every POST of somebody known', () => {
  const posts = contracts.filter(({ method }) => method === 'POST')
  expect(posts.filter(({ access }) => access === 'anyone').map((one) => one.operationId)).toEqual([
    'signIn',
  ])
})
