import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const SYSTEM = '/v1/systems/larkhaven'

/** @see https://www.rfc-editor.org/rfc/rfc9110#section-15.3.2 */
describe('201', () => {
  it.each([
    ['plain', 'plain'],
    ['half ü/?#%.x y', 'half%20%C3%BC%2F%3F%23%25.x%20y'],
  ])('answers the address of a token named %s', async (name, encoded) => {
    const { maintainer } = test.people
    const made = await maintainer.post(`${SYSTEM}/tokens`).send({ name, value: '#123' }).expect(201)
    expect(made.headers.location).toBe(`${SYSTEM}/tokens/${encoded}`)
    const { body } = await maintainer.get(made.headers.location as string).expect(200)
    expect(body.id).toBe(made.body.id)
  })

  it('answers the address of a pair, and of a system', async () => {
    const { maintainer, admin } = test.people
    await maintainer.post(`${SYSTEM}/tokens`).send({ name: 'a', value: '#123' }).expect(201)
    const pair = { foreground: 'plain', background: 'a', use: 'text' }
    const declared = await maintainer.post(`${SYSTEM}/pairs`).send(pair).expect(201)
    expect(declared.headers.location).toBe(`${SYSTEM}/pairs/${declared.body.id}`)
    const begun = await admin.post('/v1/systems').send({ key: 'annex', name: 'A' }).expect(201)
    expect(begun.headers.location).toBe('/v1/systems/annex')
  })

  it('answers the address at which a key can be revoked', async () => {
    const { engineer } = test.people
    const reader = { name: 'Reader', scopes: ['themes:read'] }
    const { headers } = await engineer.post(`${SYSTEM}/keys`).send(reader).expect(201)
    await engineer.delete(headers.location as string).expect(204)
  })
})
