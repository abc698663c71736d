import { afterAll, beforeAll, describe, expect, it } from 'vitest'
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

describe('making', () => {
  it('shows a key once and keeps its hash alone', async () => {
    const made = await make(test.people.maintainer, { scopes: ['checks:write'] })
    expect(made.key).toMatch(/^dyw_ci_[a-z2-9]{38}$/)
    expect(made.key.startsWith(made.hint)).toBe(true)
    expect(made.hint.length).toBeLessThan(16)
    const { body } = await test.people.maintainer.get(PATH).expect(200)
    expect(JSON.stringify(body)).not.toContain(made.key)
    const rows = [await sql('select * from api_keys'), await sql('select * from audit_entries')]
    expect(JSON.stringify(rows)).not.toContain(made.key)
  })

  it('makes read keys for an engineer, and refuses keys for pipelines by the missing role', async () => {
    const made = await make(test.people.engineer, { scopes: ['themes:read'], days: 365 })
    expect(made).toMatchObject({ kind: 'read', owner: { name: 'Tove Lind' } })
    const { body } = await test.people.engineer
      .post(PATH)
      .send({ name: 'x', scopes: ['themes:read', 'checks:write'] })
      .expect(403)
    expect(body.detail).toContain('maintainer')
  })

  it('refuses a key that writes for more than 90 days', async () => {
    const { body } = await test.people.maintainer
      .post(PATH)
      .send({ name: 'x', scopes: ['tokens:write'], days: 91 })
      .expect(422)
    expect(body.errors[0].pointer).toBe('/days')
    const made = await make(test.people.maintainer, { scopes: ['tokens:write'], days: 90 })
    const days = (Date.parse(made.expiresAt) - Date.parse(made.createdAt)) / 86_400_000
    expect(days).toBeCloseTo(90, 3)
  })

  it('refuses a key that asks for a key', async () => {
    const { key } = await make(test.people.maintainer, { scopes: ['tokens:write'] })
    await test
      .withKey(key)
      .post(PATH)
      .send({ name: 'x', scopes: ['themes:read'] })
      .expect(403)
  })
})

describe('using', () => {
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
})

describe('listing and revoking', () => {
  it('answers an engineer their own keys, a maintainer all', async () => {
    const own = await make(test.people.engineer, { scopes: ['themes:read'] })
    const other = await make(test.people.maintainer, { scopes: ['themes:read'] })
    const idsFor = async (agent: Agent) =>
      (await agent.get(PATH).expect(200)).body.items.map((item: { id: string }) => item.id)
    expect(await idsFor(test.people.engineer)).toContain(own.id)
    expect(await idsFor(test.people.engineer)).not.toContain(other.id)
    expect(await idsFor(test.people.maintainer)).toEqual(expect.arrayContaining([own.id, other.id]))
  })

  it('refuses a revoked key at once', async () => {
    const { id, key } = await make(test.people.maintainer, { scopes: ['themes:read'] })
    await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(200)
    await test.people.maintainer.delete(`${PATH}/${id}`).expect(204)
    await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(401)
    await test.people.maintainer.delete(`${PATH}/${id}`).expect(404)
  })

  it('refuses an engineer who revokes what is not theirs', async () => {
    const { id, key } = await make(test.people.maintainer, { scopes: ['themes:read'] })
    await test.people.engineer.delete(`${PATH}/${id}`).expect(404)
    await test.withKey(key).get('/v1/systems/larkhaven/themes').expect(200)
  })
})
