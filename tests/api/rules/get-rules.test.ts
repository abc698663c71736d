import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

describe('getRules', () => {
  it('answers no rule for a new system, and 304 to whoever has it', async () => {
    const url = '/v1/systems/larkhaven/rules'
    const { body, headers } = await test.people.engineer.get(url).expect(200)
    expect(body).toEqual({ states: {}, prefixes: [], etag: headers.etag })
    await test.people.engineer.get(url).set('If-None-Match', String(headers.etag)).expect(304)
  })
})
