import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { sarifOf } from '#shared/formats/sarif.ts'
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

  it('answers the same check as SARIF, under a validator of its own', async () => {
    const check = await system.check()
    const get = (accept: string) =>
      test.people.engineer.get(`${system.url}/checks/${check.id}`).set('Accept', accept)
    const json = await get('application/json').expect(200)
    const sarif = await get('application/sarif+json').expect(200)
    const key = system.url.split('/').at(-1) ?? ''
    expect(JSON.parse(sarif.text)).toEqual(JSON.parse(JSON.stringify(sarifOf(check, key))))
    expect(sarif.headers.vary).toContain('Accept')
    const etag = String(sarif.headers.etag)
    expect(etag).not.toBe(json.headers.etag)
    await get('application/sarif+json').set('If-None-Match', etag).expect(304)
    await get('application/json').set('If-None-Match', etag).expect(200)
    const refused = await get('image/png').expect(406)
    expect(refused.body.type).toBe('/problems/not-acceptable')
  })

  it('refuses what is not there, and a check of another system', async () => {
    const { id } = await system.check()
    const other = await createSampleSystem(test)
    await test.people.engineer.get(`${system.url}/checks/chk_nowhere`).expect(404)
    await test.people.engineer.get(`${other.url}/checks/${id}`).expect(404)
    await test.people.stranger.get(`${system.url}/checks/${id}`).expect(404)
  })
})
