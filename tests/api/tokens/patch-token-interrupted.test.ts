import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { compose, type Service } from '#api/compose.ts'
import { createDatabase, type Executor, type RunTransaction } from '#api/platform/database.ts'
import { createTestApp, type TestApp, testConfig } from '#tests/support/app.ts'
import { type Agent, createAgent, emailOf, TEST_PASSWORD } from '#tests/support/people.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

/** Which statement of the next transaction fails; `commit`: it is written, and the answer is lost. */
let failing: number | 'commit' | undefined
let statements = 0

const STATEMENTS = new Set(['select', 'insert', 'update', 'delete', 'execute'])

/** A transaction whose n-th statement does not get through. */
const interrupted = (tx: Executor): Executor =>
  new Proxy(tx, {
    get(target, name) {
      if (STATEMENTS.has(String(name))) {
        statements += 1
        if (statements === failing) throw new Error('The line went dead')
      }
      const member = Reflect.get(target, name)
      return typeof member === 'function' ? member.bind(target) : member
    },
  })

const interruptedOver =
  (transact: RunTransaction): RunTransaction =>
  async (work) => {
    statements = 0
    const done = await transact((tx) => work(interrupted(tx)))
    if (failing === 'commit') throw new Error('The answer was lost')
    return done
  }

let test: TestApp
let system: SampleSystem
let service: Service
let agent: Agent
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('note', '#000000')
  await system.addPair({ foreground: 'note', background: 'paper', use: 'text' })
  const database = createDatabase({ url: test.database.serveUrl })
  const transact = interruptedOver(database.transact)
  const config = testConfig(test.database.serveUrl)
  service = compose({ config, platform: { database, transact } })
  agent = createAgent(service.app)
  const credentials = { email: emailOf('maintainer'), password: TEST_PASSWORD }
  await agent.post('/v1/sign-in').send(credentials).expect(200)
})
afterAll(async () => {
  await service.close()
  await test.close()
})

const state = async (as: Agent) => ({
  token: (await as.get(`${system.url}/tokens/note`).expect(200)).body,
  head: (await as.get(system.url).expect(200)).body,
  revisions: (await as.get(`${system.url}/revisions`).expect(200)).body.items,
  breaches: (await as.get(`${system.url}/breaches`).expect(200)).body.items,
})

async function patch(value: string) {
  const { body } = await agent.get(`${system.url}/tokens/note`)
  return agent.patch(`${system.url}/tokens/note`).set('If-Match', body.etag).send({ value })
}

describe('patchToken, interrupted', () => {
  it('leaves everything as it was, whichever statement fails', async () => {
    const before = await state(agent)
    let failed = 0
    for (failing = 1; ; failing += 1) {
      const { status } = await patch('#888888')
      if (status === 200) break
      failed += 1
      expect(status).toBe(500)
      expect(await state(agent)).toEqual(before)
      expect(await state(test.people.maintainer)).toEqual(before)
    }
    // Lock, versions, revision, breach, event, audit and head: more than a dozen statements.
    expect(failed).toBeGreaterThan(12)
    failing = undefined
    const after = await state(agent)
    expect(after.head.head.revision).toBe(before.head.head.revision + 1)
    expect(after.breaches).toHaveLength(1)
    expect(await state(test.people.maintainer)).toEqual(after)
  })

  it('answers what was written although the answer of the commit was lost', async () => {
    failing = 'commit'
    expect((await patch('#000000')).status).toBe(500)
    failing = undefined
    const after = await state(agent)
    expect(after.token.resolved.light.rest.hex).toBe('#000000')
    expect(after.breaches).toEqual([])
    expect(await state(test.people.maintainer)).toEqual(after)
    expect((await patch('#010101')).status).toBe(200)
  })
})
