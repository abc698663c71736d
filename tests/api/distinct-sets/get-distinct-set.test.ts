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

describe('getDistinctSet', () => {
  it('answers one set to every role, and 404 for one of another system', async () => {
    const { body: made } = await system.maintainer
      .post(`${system.url}/distinct-sets`)
      .send({ name: 'Series', tokens: ['ink', 'paper'] })
      .expect(201)
    const { effect: _, ...set } = made
    for (const agent of [test.people.engineer, test.people.lead, test.people.admin]) {
      const { body } = await agent.get(`${system.url}/distinct-sets/${made.id}`).expect(200)
      expect(body).toEqual(set)
    }
    const other = await createSampleSystem(test)
    await other.maintainer.get(`${other.url}/distinct-sets/${made.id}`).expect(404)
  })
})
