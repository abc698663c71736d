import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'
import type { Agent } from '#tests/support/people.ts'

let test: TestApp
let system: SampleSystem
let key: Agent
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('grey', '#555555')
  await system.addToken('caption', '{grey}')
  await system.addToken('spare', '#666666')
  await system.addPair({ foreground: 'caption', background: 'paper', use: 'text' })
  const made = await system.maintainer
    .post(`${system.url}/keys`)
    .send({ name: 'Timetable pipeline', scopes: ['checks:write'] })
    .expect(201)
  key = test.withKey(made.body.key)
})
afterAll(() => test.close())

const coverage = async (agent: Agent = system.maintainer) =>
  (await agent.get(`${system.url}/coverage`).expect(200)).body
const send = (agent: Agent, body: object) =>
  agent.post(`${system.url}/checks`).send(body).expect(200)

const spare = { foreground: 'spare', background: 'paper', use: 'text' }
const source = { repository: 'quay/timetable', branch: 'main' }

describe('getCoverage', () => {
  it('answers tokens in no pair to every role', async () => {
    const { engineer, lead } = test.people
    for (const agent of [engineer, lead]) {
      expect(await coverage(agent)).toMatchObject({
        tokens: 5,
        uncovered: [
          { name: 'ink', deprecated: false },
          { name: 'spare', deprecated: false },
        ],
        observed: [],
      })
    }
  })

  it('answers pairs that pipelines send and nobody declared, counted also at once', async () => {
    await send(system.maintainer, { pairs: [spare] })
    expect((await coverage()).observed).toEqual([])
    const pairs = [
      spare,
      { ...spare, level: 'AAA', product: 'kiosk' },
      { foreground: 'caption', background: 'paper', use: 'text', product: 'kiosk' },
      { foreground: 'ink', background: 'grey', use: 'non-text' },
    ]
    await Promise.all([1, 2, 3, 4].map(() => send(key, { pairs, source })))
    const { observed } = await coverage()
    expect(observed).toHaveLength(2)
    expect(observed).toContainEqual({
      pair: { ...spare, relation: 'inside', level: 'AAA', product: 'kiosk' },
      missing: [],
      count: 4,
      firstSeenAt: expect.any(String),
      lastSeenAt: expect.any(String),
      ...source,
    })
    const person = { ...source, branch: 'try' }
    await send(system.maintainer, { pairs: [spare], source: person })
    expect((await coverage()).observed[0]).toMatchObject({ count: 5, ...person })
  })

  it('answers what would be declared: declared as it is, it is observed no longer', async () => {
    const { observed } = await coverage()
    for (const { pair } of observed) await system.addPair(pair)
    expect((await coverage()).observed).toEqual([])
    expect((await coverage()).uncovered).toEqual([])
  })

  it('names the tokens of a pair that are not there', async () => {
    const pairs = [{ foreground: 'candidate', background: 'paper', use: 'text' }]
    const $value = { colorSpace: 'srgb', components: [0, 0, 0] }
    await send(key, { tokens: { candidate: { $type: 'color', $value } }, pairs })
    const { observed } = await coverage()
    expect(observed).toMatchObject([{ pair: pairs[0], missing: ['candidate'] }])
    expect(observed[0]).not.toHaveProperty('repository')
  })

  it('leaves out what was not seen for 30 days, and forgets it with the next check', async () => {
    const { pool } = test.service.platform.database
    await pool.query('update observed_pairs set last_seen_at = utc_timestamp(3) - interval 31 day')
    expect((await coverage()).observed).toEqual([])
    const pairs = [{ foreground: 'ink', background: 'spare', use: 'text' }]
    await send(key, { pairs })
    const [rows] = await pool.query<never[]>('select pair from observed_pairs')
    expect(rows).toHaveLength(1)
  })
})
