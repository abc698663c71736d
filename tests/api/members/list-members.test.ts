import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const PATH = '/v1/systems/larkhaven/members'

it('answers who works on the system, by address, to any member', async () => {
  const { body, headers } = await test.people.engineer.get(PATH).expect(200)
  expect(body.items.map((item: { role: string }) => item.role)).toEqual([
    'engineer',
    'accessibility-lead',
    'maintainer',
    'maintainer',
  ])
  expect(headers.etag).toBe(body.etag)
})

it('answers 304 while the list is as it was read', async () => {
  const { headers } = await test.people.engineer.get(PATH).expect(200)
  await test.people.engineer.get(PATH).set('If-None-Match', String(headers.etag)).expect(304)
})

it('refuses a stranger as if the system were not there', async () => {
  const { body: foreign } = await test.people.stranger.get(PATH).expect(404)
  const { body: absent } = await test.people.stranger.get('/v1/systems/nowhere/members').expect(404)
  expect({ ...foreign, requestId: '' }).toEqual({ ...absent, requestId: '' })
})
