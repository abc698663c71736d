import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import { SCOPES } from '#shared/contracts/permissions.ts'
import { createTestApp, TEST_SYSTEM, type TestApp } from '#tests/support/app.ts'
import { call, isAboutSystem } from '#tests/support/guards.ts'
import { type Agent, createAgent, emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

/** Every operation, called with what was good once. A session or a key ends by the database's clock. */
let test: TestApp
const agents = new Map<string, Agent>()
const OWN = { system: TEST_SYSTEM }

const sql = async (statement: string, ...values: string[]) => {
  const [result] = await test.service.platform.database.pool.query(statement, values)
  expect((result as { affectedRows: number }).affectedRows).toBe(1)
}

async function newSession(): Promise<{ agent: Agent; id: string }> {
  const agent = createAgent(test.app)
  const body = { email: emailOf('maintainer'), password: TEST_PASSWORD }
  await agent.post('/v1/sign-in').send(body).expect(200)
  await agent.get('/v1/me').expect(200)
  const { pool } = test.service.platform.database
  const [rows] = await pool.query('select id from sessions order by id desc limit 1')
  return { agent, id: (rows as { id: string }[])[0]?.id ?? '' }
}

async function newKey(): Promise<{ agent: Agent; id: string }> {
  const { body } = await test.people.maintainer
    .post(`/v1/systems/${TEST_SYSTEM}/keys`)
    .send({ name: 'all', scopes: [...SCOPES] })
    .expect(201)
  const agent = test.withKey(body.key)
  await agent.get(`/v1/systems/${TEST_SYSTEM}`).expect(200)
  return { agent, id: body.id }
}

const ENDED = {
  'a session that was signed out': async () => {
    const { agent } = await newSession()
    await agent.post('/v1/sign-out').expect(204)
    return agent
  },
  'a session of more than 12 hours': async () => {
    const { agent, id } = await newSession()
    await sql('update sessions set expires_at = utc_timestamp(3) where id = ?', id)
    return agent
  },
  'a session that was idle for 30 minutes': async () => {
    const { agent, id } = await newSession()
    await sql(
      'update sessions set last_seen_at = utc_timestamp(3) - interval 30 minute where id = ?',
      id,
    )
    return agent
  },
  'a revoked key': async () => {
    const { agent, id } = await newKey()
    const url = `/v1/systems/${TEST_SYSTEM}/keys/${id}`
    await test.people.maintainer.delete(url).expect(204)
    return agent
  },
  'an expired key': async () => {
    const { agent, id } = await newKey()
    await sql('update api_keys set expires_at = utc_timestamp(3) where id = ?', id)
    return agent
  },
} as const satisfies Record<string, () => Promise<Agent>>
const names = Object.keys(ENDED) as (keyof typeof ENDED)[]

beforeAll(async () => {
  test = await createTestApp()
  for (const name of names) agents.set(name, await ENDED[name]())
  agents.set('live key', (await newKey()).agent)
})
afterAll(() => test.close())

const named = (list: typeof contracts) => list.map((one) => [one.operationId, one] as const)
const guarded = contracts.filter(({ access }) => access !== 'anyone')

describe.each(names)('with %s', (name) => {
  it.each(named(guarded))('%s refuses', async (_, contract) => {
    const { body } = await call(agents.get(name) as Agent, contract, OWN).expect(401)
    const code = name.includes('key') ? 'key-refused' : 'sign-in-required'
    expect(body.type).toBe(`/problems/${code}`)
  })
})

describe('of a system that is not there', () => {
  it.each(named(contracts.filter(isAboutSystem)))(
    '%s refuses a key and an administrator alike',
    async (_, contract) => {
      await call(agents.get('live key') as Agent, contract, { system: 'nowhere' }).expect(404)
      await call(test.people.admin, contract, { system: 'nowhere' }).expect(404)
    },
  )
})

describe('of an owner who has left', () => {
  it.each(named(contracts.filter(isAboutSystem)))('%s refuses a key', async (_, contract) => {
    await leave()
    await call(agents.get('live key') as Agent, contract, OWN).expect(401)
  })

  let hasLeft = false
  async function leave(): Promise<void> {
    if (hasLeft) return
    hasLeft = true
    await sql(
      'delete m from memberships m join users u on u.id = m.user_id where u.email = ?',
      emailOf('maintainer'),
    )
  }
})
