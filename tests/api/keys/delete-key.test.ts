import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent } from '#tests/support/people.ts'

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

it('needs no If-Match, and takes one that is stale', async () => {
  for (const field of [undefined, '"stale"']) {
    const { id } = await make(test.people.engineer, { scopes: ['themes:read'] })
    const request = test.people.engineer.delete(`${PATH}/${id}`)
    if (field !== undefined) request.set('If-Match', field)
    await request.expect(204)
  }
})

it('lets one of two revocations at once through, and logs it once', async () => {
  const { id } = await make(test.people.maintainer, { scopes: ['themes:read'] })
  const revoke = () => test.people.maintainer.delete(`${PATH}/${id}`)
  const statuses = (await Promise.all([revoke(), revoke()])).map(({ status }) => status)
  expect(statuses.toSorted()).toEqual([204, 404])
  const rows = await sql(
    "select * from audit_entries where action = 'key.revoked' and subject = ?",
    [id],
  )
  expect(rows).toHaveLength(1)
})

it('leaves other keys of the same owner in force', async () => {
  const [gone, kept] = [
    await make(test.people.engineer, { scopes: ['themes:read'] }),
    await make(test.people.engineer, { scopes: ['themes:read'] }),
  ]
  await test.people.engineer.delete(`${PATH}/${gone.id}`).expect(204)
  await test.withKey(kept.key).get('/v1/systems/larkhaven/themes').expect(200)
})
