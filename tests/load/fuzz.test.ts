import { createPool, type Pool, type RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import type { Contract } from '#shared/contracts/route.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { sampleBody } from '#tests/support/body-sample.ts'
import { ADDRESS_PARTS, HEADERS, mutated, SOUND_NAMES } from '#tests/support/hostile-values.ts'
import { findInconsistencies } from '#tests/support/inconsistencies.ts'
import { createRandom } from '#tests/support/random.ts'

/**
 * Requests made from the document, sound, broken and out of order, by everybody. The people's clients hold every
 * answer against the document, and the service answers 500 in test where it leaves its contract. A longer run:
 * `FUZZ_SEED=7 FUZZ_REQUESTS=5000`.
 */
const SEED = Number(process.env.FUZZ_SEED ?? 20261201)
const REQUESTS = Number(process.env.FUZZ_REQUESTS ?? 200)
const SYSTEM = '/v1/systems/larkhaven'
/** One ends the session of who sends the rest; two search for seconds and write nothing. */
const LEFT_OUT = ['signOut', 'planRepair', 'nearestPassing']
/** What a refused request may move: what was spent, and who was last seen when. */
const MOVES_ALWAYS = /idempotency|rate_|session|attempt|migrations|api_keys|jobs/

let test: TestApp
let pool: Pool
let tables: string[]
const random = createRandom(SEED)
const ids = ['nothing']

beforeAll(async () => {
  test = await createTestApp()
  pool = createPool({ uri: test.database.adminUrl, timezone: 'Z' })
  const [rows] = await pool.query<RowDataPacket[]>(
    'select table_name as name from information_schema.tables where table_schema = database()',
  )
  tables = rows.map(({ name }) => String(name)).filter((name) => !MOVES_ALWAYS.test(name))
  const { maintainer } = test.people
  for (const name of SOUND_NAMES) {
    const value = { deck: '#fff', ink: '#000', glass: '#ff000080' }[name as string] ?? '#2283c1'
    await maintainer
      .post(`${SYSTEM}/tokens`)
      .send({ name, value, states: ['hover'] })
      .expect(201)
  }
  const light = { name: 'Light', ground: 'deck', ink: 'ink' }
  await maintainer.put(`${SYSTEM}/themes/light`).set('If-None-Match', '*').send(light).expect(201)
  for (const foreground of ['ink', 'glass', 'accent']) {
    const pair = { foreground, background: 'deck', use: 'text' }
    ids.push((await maintainer.post(`${SYSTEM}/pairs`).send(pair).expect(201)).body.id)
  }
  const { body } = await maintainer.get(`${SYSTEM}/breaches`).expect(200)
  ids.push(...body.items.map(({ id }: { id: string }) => id))
})
afterAll(async () => {
  await pool.end()
  await test.close()
})

async function stateOf(): Promise<string> {
  const sql = `checksum table ${tables.map((name) => `\`${name}\``).join(', ')}`
  return JSON.stringify((await pool.query<RowDataPacket[]>(sql))[0])
}

const segmentOf = (name: string): string => {
  if (random.chance(0.05)) return random.pick(ADDRESS_PARTS)
  const sound: Record<string, readonly string[]> = {
    system: ['larkhaven'],
    name: SOUND_NAMES,
    theme: ['light', 'dark'],
    format: ['css', 'json'],
    number: ['1', '4'],
    id: ids,
  }
  return random.pick(sound[name] ?? ['x'])
}

function addressOf({ path, query }: Contract): { path: string; search: string } {
  const parts = Object.keys(query?.shape ?? {})
    .filter(() => random.chance(0.15))
    .map((name) => `${name}=${random.pick([...ADDRESS_PARTS, 'text', 'true', 'deck'])}`)
  if (random.chance(0.05)) parts.push(random.pick(['x=1', '__proto__=1', 'limit=1&limit=2', '=&%']))
  const search = parts.length === 0 ? '' : `?${parts.join('&')}`
  return { path: path.replace(/\{(\w+)\}/g, (_, name: string) => segmentOf(name)), search }
}

function bodyOf({ operationId, bodyExample }: Contract): string {
  if (random.chance(0.03)) return random.pick(['', '{', '{} {}', '[[', '"\\ud800"', '{"a":1e999}'])
  let body = random.chance(0.7) ? sampleBody(operationId, random) : bodyExample
  for (let left = Math.max(0, random.below(5) - 2); left > 0; left -= 1)
    body = mutated(body, random)
  return JSON.stringify(body ?? null)
}

async function send(contract: Contract) {
  const { people, anonymous } = test
  const { admin, maintainer, lead, engineer, stranger } = people
  const everyone = [admin, admin, maintainer, maintainer, maintainer, lead, engineer, stranger]
  const { path, search } = addressOf(contract)
  const agent = random.pick([...everyone, anonymous])
  const request = agent[contract.method.toLowerCase() as 'get'](path + search)
  if (contract.precondition !== undefined) {
    const { headers } = await maintainer.get(path)
    request.set(
      ...((headers.etag ? ['If-Match', headers.etag] : ['If-None-Match', '*']) as [string, string]),
    )
  }
  if (contract.body !== undefined) request.set('Content-Type', 'application/json')
  if (random.chance(0.15)) request.set(...(random.pick(HEADERS) as [string, string]))
  return contract.body === undefined ? request : request.serialize(String).send(bodyOf(contract))
}

const attacked: readonly Contract[] = contracts.filter(
  ({ operationId }: Contract) => !LEFT_OUT.includes(operationId),
)
const writes = attacked.filter(({ method }) => method !== 'GET')

it(`leaves nothing half done of ${REQUESTS} requests, seed ${SEED}`, async () => {
  const wrong: string[] = []
  let before = await stateOf()
  for (let sent = 0; sent < REQUESTS; sent += 1) {
    const contract = random.pick(random.chance(0.75) ? writes : attacked)
    const { status, body, text } = await send(contract)
    const about = `request ${sent}, ${contract.operationId} → ${status} ${text.slice(0, 500)}`
    if (status >= 500) wrong.push(about)
    if (status === 422 && !(body.errors?.length > 0)) wrong.push(`no fault is named: ${about}`)
    const after = await stateOf()
    if (status >= 300 && after !== before) wrong.push(`a refusal moved something: ${about}`)
    before = after
    if (status === 201 && typeof body.id === 'string') ids.push(body.id)
  }
  expect(wrong).toEqual([])
  expect(await findInconsistencies(pool)).toEqual([])
})
