import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

/** Tinted ones take a search in lightness and chroma. */
const TINTED = 16
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  for (let at = 0; at < TINTED; at += 1) {
    await system.addToken(`dye.${at}`, `oklch(0.85 0.1 ${at * 22})`)
    await system.addPair({ foreground: `dye.${at}`, background: 'paper', use: 'text' })
  }
})
afterAll(() => test.close())

const plan = (budget: number) =>
  test.people.engineer.post(`${system.url}/repair-plan`).send({ budget })

/** Asks for the job and for signs of life in turn; how far it was, and how often it was answered meanwhile. */
async function watched(address: string, agent = test.people.engineer) {
  const evaluations: number[] = []
  for (let answers = 0; ; answers += 1) {
    const job: JobWire = (await agent.get(address).expect(200)).body
    evaluations.push(job.progress.evaluations ?? 0)
    if (job.state !== 'running') return { job, evaluations, answers }
    await test.anonymous.get('/healthz').expect(200)
  }
}

describe('a plan that takes long', () => {
  it('answers 202 with a job, and whoever else asks meanwhile; it ends in what passes', async () => {
    const before = await system.maintainer.get(system.url).expect(200)
    const { body, headers } = await plan(200_000).expect(202)
    expect(body).toMatchObject({ kind: 'repair-plan', state: 'running' })
    expect(headers.location).toBe(`${system.url}/jobs/${body.id}`)
    const { job, evaluations, answers } = await watched(String(headers.location))
    expect(answers).toBeGreaterThan(10)
    expect(evaluations).toEqual(evaluations.toSorted((a, b) => a - b))
    expect(evaluations.at(-1)).toBeGreaterThan(0)
    expect(job).toMatchObject({
      state: 'done',
      progress: { budget: 200_000, measured: before.body.counts.tokens },
      result: { breachesBefore: TINTED, left: [], stopped: false, after: { verdict: 'pass' } },
    })
    const after = await system.maintainer.get(system.url).expect(200)
    expect(after.body).toEqual(before.body)
  })

  it('answers at once where the budget is small, and says that it stopped early', async () => {
    const { body } = await plan(3000).expect(200)
    expect(body).toMatchObject({ stopped: true, after: { verdict: 'fail' } })
    expect(body.left.map(({ reason }: { reason: string }) => reason)).toContain('budget')
  })

  it('answers one job for one Idempotency-Key', async () => {
    const ask = () => plan(200_000).set('Idempotency-Key', '"long-plan"')
    const first = await ask().expect(202)
    expect((await ask().expect(202)).body).toEqual(first.body)
    const { job } = await watched(String(first.headers.location))
    expect(job.state).toBe('done')
  })

  it('answers the job to the key that asked, and to no other', async () => {
    const keyFor = async (name: string) => {
      const made = await system.maintainer
        .post(`${system.url}/keys`)
        .send({ name, scopes: ['themes:read'] })
      return test.withKey(made.body.key)
    }
    const [own, other] = [await keyFor('asks'), await keyFor('does not')]
    const { headers } = await own
      .post(`${system.url}/repair-plan`)
      .send({ budget: 200_000 })
      .expect(202)
    await other.get(String(headers.location)).expect(404)
    expect((await watched(String(headers.location), own)).job.state).toBe('done')
  })
})

describe('the search for one token', () => {
  it('answers at once: no budget that it takes is long in a small system', async () => {
    const { body } = await test.people.engineer
      .post(`${system.url}/tokens/dye.3/nearest-passing`)
      .send({ budget: 50_000 })
      .expect(200)
    expect(body).toMatchObject({ outcome: 'found', stopped: false })
  })
})
