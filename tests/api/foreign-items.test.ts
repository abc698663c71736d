import { afterAll, beforeAll, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import type { Contract } from '#shared/contracts/route.ts'
import { createTestApp, TEST_SYSTEM, type TestApp } from '#tests/support/app.ts'
import { call, roleHolds } from '#tests/support/guards.ts'

/**
 * Items of one system, asked for by a member of both under the address of another: absent there. A token's
 * name and a theme's key are no secrets, so the other system has none of that name.
 */
let test: TestApp
const ids = new Map<string, string>()

beforeAll(async () => {
  test = await createTestApp()
  await test.createSystem('elsewhere')
  const { maintainer } = test.people
  const own = `/v1/systems/${TEST_SYSTEM}`
  const token = async (name: string, value: string) =>
    maintainer.post(`${own}/tokens`).send({ name, value }).expect(201)
  await token('deck', '#fff')
  await token('ink', '#000')
  await token('action.board.fill', '#bbb')
  const light = { name: 'Light', ground: 'deck', ink: 'ink' }
  await maintainer.put(`${own}/themes/light`).set('If-None-Match', '*').send(light).expect(201)
  const pair = { foreground: 'action.board.fill', background: 'deck', use: 'text' }
  const made = await maintainer.post(`${own}/pairs`).send(pair).expect(201)
  const key = await maintainer.post(`${own}/keys`).send({ name: 'x', scopes: ['themes:read'] })
  const check = await maintainer.post(`${own}/checks`).send({}).expect(200)
  const set = { name: 'Deck and ink', tokens: ['deck', 'ink'] }
  const distinct = await maintainer.post(`${own}/distinct-sets`).send(set).expect(201)
  const breaches = await maintainer.get(`${own}/breaches`).expect(200)
  ids.set('pairs', made.body.id)
  ids.set('keys', key.body.id)
  ids.set('checks', check.body.id)
  ids.set('distinct-sets', distinct.body.id)
  ids.set('breaches', breaches.body.items[0].id)
  ids.set('jobs', await addJob())
})
afterAll(() => test.close())

/** Long work takes long to make, so its row is written as the service would. */
async function addJob(): Promise<string> {
  const { pool } = test.service.platform.database
  await pool.query(
    `insert into jobs (id, system_id, kind, request_id, progress, lease_ends_at)
     select 'job_foreign', id, 'import', 'req_test', '{"total":0,"read":0,"resolved":0,"measured":0}',
       utc_timestamp(3) + interval 1 hour from systems where \`key\` = ?`,
    [TEST_SYSTEM],
  )
  return 'job_foreign'
}

const ITEM = /\{(id|name|theme)\}/
const items = contracts.filter(({ path }) => path.includes('{system}') && ITEM.test(path))
const cases = items.map((contract) => [contract.operationId, contract] as const)

/** An item that is not there would be absent everywhere. */
function idFor({ feature, path }: Contract): string {
  const id = ids.get(feature)
  if (id === undefined && path.includes('{id}')) throw new Error(`No item of ${feature} was made`)
  return id ?? ''
}

const paramsOf = (contract: Contract, system: string) => ({
  system,
  id: idFor(contract),
  name: 'action.board.fill',
  theme: 'light',
})

it.each(cases.filter(([, { method }]) => method === 'GET'))(
  '%s answers in the system of the item',
  async (_, contract) => {
    await call(test.people.maintainer, contract, paramsOf(contract, TEST_SYSTEM)).expect(200)
  },
)

it.each(cases.filter(([, { precondition }]) => precondition !== 'create'))(
  '%s refuses in another system',
  async (_, contract) => {
    const { maintainer, lead } = test.people
    const { body } = await call(
      roleHolds('maintainer', contract.access) ? maintainer : lead,
      contract,
      paramsOf(contract, 'elsewhere'),
    )
    expect(body).toMatchObject({ status: 404, type: '/problems/not-found' })
  },
)
