import type { RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent } from '#tests/support/people.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const MOST = 20_000
/** In groups of a hundred; each fifth refers to the one before it. */
function manyTokens(count: number): object {
  const groups: Record<string, Record<string, object>> = {}
  for (let at = 0; at < count; at += 1) {
    const group = `g${Math.floor(at / 100)}`
    groups[group] ??= { paper: dtcgHex('#ffffff') }
    const hex = at.toString(16).padStart(6, '0')
    groups[group][`t${at}`] =
      at % 5 === 4 && at % 100 > 0
        ? { $type: 'color', $value: `{${group}.t${at - 1}}` }
        : dtcgHex(`#${hex}`)
  }
  for (const group of Object.values(groups)) delete group.paper
  return groups
}

/** Asks until the job has ended; how far it was each time comes along. */
async function ended(agent: Agent, address: string) {
  const seen: JobWire['progress'][] = []
  for (;;) {
    const job: JobWire = (await agent.get(address).expect(200)).body
    seen.push(job.progress)
    if (job.state !== 'running') return { job, seen }
    await new Promise((resolve) => setTimeout(resolve, 50))
  }
}

const startImport = (document: object, query = '', agent = system.maintainer) =>
  agent.post(`${system.url}/imports${query}`).send(document)

const revision = async () =>
  (await system.maintainer.get(system.url).expect(200)).body.head.revision

const pool = () => test.service.platform.database.pool
async function jobWith(columns: Record<string, unknown>): Promise<string> {
  const id = `job_${Math.random().toString(36).slice(2)}`
  const [[row]] = await pool().query<(RowDataPacket & { id: string })[]>(
    'select id from systems where `key` = ?',
    [system.url.split('/').at(-1)],
  )
  await pool().query('insert into jobs set ?', {
    id,
    system_id: row?.id,
    kind: 'import',
    request_id: 'req_test',
    progress: JSON.stringify({ total: 9, read: 9, resolved: 0, measured: 0 }),
    lease_ends_at: '2020-01-01 00:00:00.000',
    ...columns,
  })
  return `${system.url}/jobs/${id}`
}

describe('an import of 20,000 tokens', () => {
  it('answers 202 with a job, which ends in one revision and what the import answers', async () => {
    const before = await revision()
    const { body, headers } = await startImport(manyTokens(MOST)).expect(202)
    expect(body).toMatchObject({ kind: 'import', state: 'running', progress: { total: MOST } })
    expect(headers.location).toBe(`${system.url}/jobs/${body.id}`)
    const { job, seen } = await ended(system.maintainer, String(headers.location))
    expect(job).toMatchObject({
      state: 'done',
      progress: { total: MOST, read: MOST, resolved: MOST, measured: MOST },
      result: {
        written: true,
        counts: { tokens: { added: MOST, edited: 0, removed: 0, unchanged: 2 } },
        more: { changes: MOST - 5000 },
        effect: { revision: before + 1 },
      },
    })
    expect(seen.map(({ read }) => read)).toEqual(seen.map(({ read }) => read).sort((a, b) => a - b))
    const { body: found } = await system.maintainer.get(system.url).expect(200)
    expect(found.counts.tokens).toBe(MOST + 2)
  }, 60_000)

  it('answers no revision for the same file again', async () => {
    const before = await revision()
    const { headers } = await startImport(manyTokens(MOST)).expect(202)
    const { job } = await ended(system.maintainer, String(headers.location))
    expect(job.result).toMatchObject({ written: false, changes: [], effect: { revision: before } })
  }, 60_000)

  it('answers one job for one Idempotency-Key', async () => {
    const send = () =>
      startImport(manyTokens(MOST), '?dryRun=true').set('Idempotency-Key', '"long"')
    const first = await send().expect(202)
    const again = await send().expect(202)
    expect(again.body).toEqual(first.body)
    expect(again.headers.location).toBe(first.headers.location)
    const { job } = await ended(system.maintainer, String(first.headers.location))
    expect(job.result).toMatchObject({ dryRun: true })
  }, 60_000)

  it('leaves nothing behind where it fails, and says why as a problem', async () => {
    const before = await revision()
    const file = { ...manyTokens(MOST - 1), bad: { $type: 'color', $value: 'red' } }
    const { headers } = await startImport(file).expect(202)
    const { job } = await ended(system.maintainer, String(headers.location))
    expect(job).toMatchObject({
      state: 'failed',
      problem: {
        type: '/problems/request-invalid',
        status: 422,
        errors: [{ pointer: '/bad/$value' }],
      },
    })
    expect(job).not.toHaveProperty('result')
    expect(job.finishedAt).not.toBeNull()
    expect(await revision()).toBe(before)
  }, 60_000)
})

describe('a job whose process is gone', () => {
  it('answers that it failed, by the clock of the database', async () => {
    const address = await jobWith({})
    const { body } = await system.maintainer.get(address).expect(200)
    expect(body).toMatchObject({
      state: 'failed',
      problem: { type: '/problems/job-interrupted', status: 503, requestId: 'req_test' },
      finishedAt: '2020-01-01T00:00:00.000Z',
    })
  })

  it('answers that it runs while its lease does', async () => {
    const address = await jobWith({ lease_ends_at: '2100-01-01 00:00:00.000' })
    const { body } = await system.maintainer.get(address).expect(200)
    expect(body).toMatchObject({ state: 'running', finishedAt: null })
  })

  it('leaves nothing of work that ends after its lease', async () => {
    const before = await revision()
    const { body, headers } = await startImport(manyTokens(MOST), '?mode=merge').expect(202)
    await pool().query('update jobs set lease_ends_at = utc_timestamp(3) where id = ?', [body.id])
    const { job } = await ended(system.maintainer, String(headers.location))
    expect(job).toMatchObject({ state: 'failed', problem: { type: '/problems/job-interrupted' } })
    expect(await revision()).toBe(before)
  }, 60_000)

  it('answers the same job until it changes, and clears old ones away', async () => {
    const address = await jobWith({ created_at: '2020-01-01 00:00:00.000' })
    const { headers } = await system.maintainer.get(address).expect(200)
    await system.maintainer.get(address).set('If-None-Match', String(headers.etag)).expect(304)
    const { headers: next } = await startImport(manyTokens(MOST), '?dryRun=true').expect(202)
    await system.maintainer.get(address).expect(404)
    await ended(system.maintainer, String(next.location))
  }, 60_000)
})

describe('who may know', () => {
  const keyWith = async (scopes: string[]) => {
    const made = await system.maintainer.post(`${system.url}/keys`).send({ name: 'job', scopes })
    return { id: made.body.id, agent: test.withKey(made.body.key) }
  }

  it('answers every member, and a key its own jobs alone', async () => {
    const own = await keyWith(['tokens:write'])
    const other = await keyWith(['tokens:write'])
    const address = await jobWith({ caller_key_id: own.id })
    for (const agent of [test.people.engineer, test.people.lead, own.agent]) {
      await agent.get(address).expect(200)
    }
    await other.agent.get(address).expect(404)
    await test.people.stranger.get(address).expect(404)
    const { agent } = await keyWith(['themes:read'])
    await agent.get(address).expect(404)
  })

  it('refuses an id that there is not', async () => {
    await system.maintainer.get(`${system.url}/jobs/job_none`).expect(404)
  })
})
