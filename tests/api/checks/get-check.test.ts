import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
  await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
})
afterAll(() => test.close())

describe('getCheck', () => {
  it('answers a check as it was answered, without the findings that passed', async () => {
    const check = await system.check({ source: { branch: 'main' } }, '?findings=all')
    const { body } = await test.people.engineer.get(`${system.url}/checks/${check.id}`).expect(200)
    expect(check.findings).toHaveLength(2)
    expect(body).toEqual({
      ...check,
      findings: check.findings.filter(({ outcome }) => outcome !== 'pass'),
    })
  })

  it('keeps the names of its day', async () => {
    const check = await system.check()
    await system.editToken('soft', { name: 'softer' })
    const { body } = await test.people.engineer.get(`${system.url}/checks/${check.id}`).expect(200)
    expect(body.findings).toEqual(check.findings)
  })

  it('answers 304 to whoever has it already', async () => {
    const { id } = await system.check()
    const url = `${system.url}/checks/${id}`
    const { headers } = await test.people.engineer.get(url).expect(200)
    await test.people.engineer.get(url).set('If-None-Match', String(headers.etag)).expect(304)
  })

  it('refuses what is not there, and a check of another system', async () => {
    const { id } = await system.check()
    const other = await createSampleSystem(test)
    await test.people.engineer.get(`${system.url}/checks/chk_nowhere`).expect(404)
    await test.people.engineer.get(`${other.url}/checks/${id}`).expect(404)
    await test.people.stranger.get(`${system.url}/checks/${id}`).expect(404)
  })
})
