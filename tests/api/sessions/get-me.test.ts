import supertest from 'supertest'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createAgent, emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const sql = (statement: string, values: unknown[] = []) =>
  test.service.platform.database.pool.query(statement, values)

/** A further session of the engineer. */
const freshSession = async () => {
  const agent = createAgent(test.app)
  await agent
    .post('/v1/sign-in')
    .send({ email: emailOf('engineer'), password: TEST_PASSWORD })
    .expect(200)
  const [rows] = await test.service.platform.database.pool.query<never[]>(
    'select id from sessions order by created_at desc, id desc limit 1',
  )
  return { agent, id: (rows as { id: string }[])[0]?.id }
}

it('answers who is signed in with their role in each system', async () => {
  const { body } = await test.people.lead.get('/v1/me').expect(200)
  expect(body).toMatchObject({
    user: { email: emailOf('lead'), name: 'Noor Haddad', admin: false },
    roles: { larkhaven: 'accessibility-lead' },
  })
})

it('refuses a key: it is no person', async () => {
  const { body: key } = await test.people.engineer
    .post('/v1/systems/larkhaven/keys')
    .send({ name: 'x', scopes: ['themes:read'] })
    .expect(201)
  const { body } = await test.withKey(key.key).get('/v1/me').expect(403)
  expect(body.type).toBe('/problems/scope-missing')
})

it('refuses a session that was idle for 30 minutes', async () => {
  const { agent, id } = await freshSession()
  await sql(
    'update sessions set last_seen_at = utc_timestamp(3) - interval 29 minute where id = ?',
    [id],
  )
  await agent.get('/v1/me').expect(200)
  await sql(
    'update sessions set last_seen_at = utc_timestamp(3) - interval 30 minute where id = ?',
    [id],
  )
  await agent.get('/v1/me').expect(401)
})

it('leaves a session alive that is used, but not beyond its 12 hours', async () => {
  const { agent, id } = await freshSession()
  await sql(
    'update sessions set last_seen_at = utc_timestamp(3) - interval 20 minute where id = ?',
    [id],
  )
  await agent.get('/v1/me').expect(200)
  const [rows] = await test.service.platform.database.pool.query<never[]>(
    `select timestampdiff(second, last_seen_at, utc_timestamp(3)) as idle,
            timestampdiff(minute, created_at, expires_at) as minutes from sessions where id = ?`,
    [id],
  )
  const [row] = rows as { idle: number; minutes: number }[]
  expect(row?.idle).toBeLessThan(5)
  expect(row?.minutes).toBe(720)
  await sql('update sessions set expires_at = utc_timestamp(3) where id = ?', [id])
  await agent.get('/v1/me').expect(401)
})

it('refuses every session of an account that was ended', async () => {
  const account = {
    email: 'leaver@quay.test',
    name: 'Leaver',
    password: TEST_PASSWORD,
    isAdmin: false,
  }
  await test.services.accounts.create(account)
  const agent = createAgent(test.app)
  await agent
    .post('/v1/sign-in')
    .send({ email: account.email, password: TEST_PASSWORD })
    .expect(200)
  await sql(`update users set deactivated_at = utc_timestamp(3) where email = 'leaver@quay.test'`)
  await agent.get('/v1/me').expect(401)
})

it.each([
  'dyewright=',
  'dyewright=x',
  'dyewright="',
  'dyewright',
  ';;;=',
  'dyewright=%00',
  'other=1',
])('refuses the cookie %s', async (cookie) => {
  await supertest(test.app).get('/v1/me').set('Cookie', cookie).expect(401)
})
