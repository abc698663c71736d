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

it('answers an engineer their own keys, a maintainer all', async () => {
  const own = await make(test.people.engineer, { scopes: ['themes:read'] })
  const other = await make(test.people.maintainer, { scopes: ['themes:read'] })
  const idsFor = async (agent: Agent) =>
    (await agent.get(PATH).expect(200)).body.items.map((item: { id: string }) => item.id)
  expect(await idsFor(test.people.engineer)).toContain(own.id)
  expect(await idsFor(test.people.engineer)).not.toContain(other.id)
  expect(await idsFor(test.people.maintainer)).toEqual(expect.arrayContaining([own.id, other.id]))
})

it('answers what tells a key from others, when it ends and when it was used, and no secret', async () => {
  const made = await make(test.people.maintainer, { scopes: ['checks:write', 'themes:read'] })
  const one = async () => {
    const { body, text } = await test.people.maintainer.get(PATH).expect(200)
    expect(text).not.toContain(made.key)
    const [row] = await sql('select secret_hash as hash from api_keys where id = ?', [made.id])
    expect(text).not.toContain(String(row?.hash))
    return body.items.find(({ id }: { id: string }) => id === made.id)
  }
  const { key: _, ...shown } = made
  expect(await one()).toEqual(shown)
  expect(shown).toMatchObject({ kind: 'ci', lastUsedAt: null, owner: { name: 'Ines Marrow' } })
  await test.withKey(made.key).get('/v1/systems/larkhaven/themes').expect(200)
  expect(Date.parse((await one()).lastUsedAt)).toBeGreaterThanOrEqual(Date.parse(made.createdAt))
})

it('leaves out keys that were revoked or have ended', async () => {
  const [ended, revoked, lasting] = [
    await make(test.people.engineer, { scopes: ['themes:read'] }),
    await make(test.people.engineer, { scopes: ['themes:read'] }),
    await make(test.people.engineer, { scopes: ['themes:read'] }),
  ]
  await sql('update api_keys set expires_at = utc_timestamp(3) where id = ?', [ended.id])
  await test.people.engineer.delete(`${PATH}/${revoked.id}`).expect(204)
  const { body } = await test.people.engineer.get(PATH).expect(200)
  const ids = body.items.map(({ id }: { id: string }) => id)
  expect(ids).toContain(lasting.id)
  expect(ids).not.toContain(ended.id)
  expect(ids).not.toContain(revoked.id)
})

it('refuses a key, a stranger and nobody', async () => {
  const { key } = await make(test.people.maintainer, { scopes: ['tokens:write'] })
  await test.withKey(key).get(PATH).expect(403)
  await test.people.stranger.get(PATH).expect(404)
  await test.anonymous.get(PATH).expect(401)
})
