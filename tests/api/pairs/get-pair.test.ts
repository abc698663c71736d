import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

describe('getPair', () => {
  it('answers the pair, and 304 to whoever has it', async () => {
    const id = await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    const { body, headers } = await test.people.engineer.get(`${system.url}/pairs/${id}`)
    expect(body).toMatchObject({ id, foreground: 'ink', background: 'paper', relation: 'inside' })
    await test.people.engineer
      .get(`${system.url}/pairs/${id}`)
      .set('If-None-Match', String(headers.etag))
      .expect(304)
  })

  it('refuses the id of a pair of another system', async () => {
    const other = await createSampleSystem(test)
    const id = await other.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    await test.people.engineer.get(`${system.url}/pairs/${id}`).expect(404)
  })
})
