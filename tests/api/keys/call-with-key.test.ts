import { afterAll, beforeAll, expect, it } from 'vitest'
import { newApiKey } from '#api/platform/secrets.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { type Agent, emailOf } from '#tests/support/people.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const PATH = '/v1/systems/larkhaven/keys'
const sql = async (statement: string, values: unknown[] = []) => {
  const [rows] = await test.service.platform.database.pool.query<never[]>(statement, values)
  return rows as Record<string, unknown>[]
}
const make = async (agent: Agent, body: object) =>
  (
    await agent
      .post(PATH)
      .send({ name: 'Timetable', ...body })
      .expect(201)
  ).body

it('lets a key do what its scopes say, and notes its use at most once a minute', async () => {
  const { id, key } = await make(test.people.maintainer, { scopes: ['themes:read'] })
  const usedAt = async () => {
    const [row] = await sql('select last_used_at as at from api_keys where id = ?', [id])
    return (row?.at as Date | null)?.getTime()
  }
  expect(await usedAt()).toBeUndefined()
  await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(200)
  const first = Number(await usedAt())
  await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(200)
  expect(await usedAt()).toBe(first)
  await sql('update api_keys set last_used_at = last_used_at - interval 2 minute where id = ?', [
    id,
  ])
  await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(200)
  expect(await usedAt()).toBeGreaterThanOrEqual(first)
})

it('beats a cookie: a bad key is refused even beside a good session', async () => {
  await test.people.maintainer.get('/v1/me').expect(200)
  for (const field of ['Bearer dyw_ci_x', 'Basic YTpi', 'Bearer', `Bearer ${newApiKey('ci')}`]) {
    const { body } = await test.people.maintainer
      .get('/v1/me')
      .set('Authorization', field)
      .expect(401)
    expect(body.type).toBe('/problems/key-refused')
  }
})

it('refuses one that is mistyped without a query', async () => {
  const { key } = await make(test.people.maintainer, { scopes: ['themes:read'] })
  const mistyped = key.replace(/.$/, key.endsWith('a') ? 'b' : 'a')
  const { pool } = test.service.platform.database
  let queries = 0
  const count = () => {
    queries += 1
  }
  pool.on('acquire', count)
  await test.withKey(mistyped).get('/v1/systems/larkhaven/themes').expect(401)
  pool.off('acquire', count)
  expect(queries).toBe(0)
})

it('refuses one that has expired by the database’s clock', async () => {
  const { id, key } = await make(test.people.maintainer, { scopes: ['themes:read'] })
  await sql('update api_keys set expires_at = utc_timestamp(3) where id = ?', [id])
  await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(401)
})

it('refuses a key once its owner has left, and what its owner may no longer do', async () => {
  const { admin, otherMaintainer } = test.people
  const { key } = await make(otherMaintainer, { scopes: ['tokens:write'] })
  const email = emailOf('otherMaintainer')
  const setRole = async (role: string | undefined) => {
    const { body, headers } = await admin.get('/v1/systems/larkhaven/members').expect(200)
    const others = (body.items as { email: string; role: string }[]).flatMap((item) =>
      item.email === email ? [] : [{ email: item.email, role: item.role }],
    )
    await admin
      .put('/v1/systems/larkhaven/members')
      .set('If-Match', String(headers.etag))
      .send({ items: role === undefined ? others : [...others, { email, role }] })
      .expect(200)
  }
  const write = () =>
    test.withKey(key).post('/v1/systems/larkhaven/tokens').send({ name: 'by.key', value: '#abc' })
  await setRole('engineer')
  expect((await write().expect(403)).body.type).toBe('/problems/role-missing')
  await setRole(undefined)
  await write().expect(401)
  await setRole('maintainer')
  await write().expect(201)
})
