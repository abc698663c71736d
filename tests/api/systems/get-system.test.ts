import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

describe('getSystem', () => {
  it('answers counts and head, and 304 until one of them moves', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('grey', '#8a8a8a')
    await system.addPair({ foreground: 'grey', background: 'paper', use: 'text' })
    const { body, headers } = await test.people.engineer.get(system.url).expect(200)
    expect(body).toMatchObject({
      counts: { tokens: 3, pairs: 1, themes: 1, openBreaches: 1 },
      head: { verdict: 'fail', author: { name: 'Ines Marrow' } },
    })
    const again = () =>
      test.people.engineer.get(system.url).set('If-None-Match', String(headers.etag))
    await again().expect(304)
    await system.editToken('grey', { value: '#333333' })
    const { body: after } = await again().expect(200)
    expect(after.counts.openBreaches).toBe(0)
    expect(after.head.revision).toBe(body.head.revision + 1)
  })

  it('refuses a stranger as if nothing were there', async () => {
    const foreign = await test.people.stranger.get('/v1/systems/larkhaven').expect(404)
    const absent = await test.people.stranger.get('/v1/systems/nowhere').expect(404)
    expect(foreign.body.type).toBe(absent.body.type)
  })
})
