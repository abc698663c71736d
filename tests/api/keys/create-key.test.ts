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

it('refuses an unknown scope, no scope, and what is no number of days, each with its pointer', async () => {
  const { body } = await test.people.maintainer
    .post(PATH)
    .send({ name: ' ', scopes: ['everything'], days: 0 })
    .expect(422)
  expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).toSorted()).toEqual([
    '/days',
    '/name',
    '/scopes/0',
  ])
  for (const days of [366, 1.5, '90', null]) {
    const wrong = { name: 'x', scopes: ['themes:read'], days }
    await test.people.engineer.post(PATH).send(wrong).expect(422)
  }
  await test.people.engineer.post(PATH).send({ name: 'x', scopes: [] }).expect(422)
})

it.each([
  ['engineer', ['themes:read']],
  ['lead', ['themes:read']],
  ['maintainer', ['themes:read', 'checks:write', 'tokens:write']],
  ['admin', ['themes:read', 'checks:write', 'tokens:write']],
] as const)('takes of %s no scope but those of the role', async (person, allowed) => {
  for (const scope of ['themes:read', 'checks:write', 'tokens:write'] as const) {
    const wanted = { name: scope, scopes: [scope] }
    const { status } = await test.people[person].post(PATH).send(wanted)
    expect(status).toBe((allowed as readonly string[]).includes(scope) ? 201 : 403)
  }
})

it('logs who made which key, never the key', async () => {
  const made = await make(test.people.maintainer, { scopes: ['checks:write'], days: 30 })
  const rows = await sql(
    "select * from audit_entries where action = 'key.created' and subject = ?",
    [made.id],
  )
  expect(rows).toMatchObject([
    { details: JSON.stringify({ days: 30, kind: 'ci', scopes: ['checks:write'] }) },
  ])
})
