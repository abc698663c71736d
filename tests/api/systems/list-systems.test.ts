import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
  await test.people.admin.post('/v1/systems').send({ key: 'annex', name: 'Annex' }).expect(201)
})
afterAll(() => test.close())

describe('listSystems', () => {
  it('answers each the systems that they may know of', async () => {
    const keysFor = async (agent: TestApp['anonymous']) => {
      const { body } = await agent.get('/v1/systems').expect(200)
      return body.items.map(({ key }: { key: string }) => key)
    }
    expect(await keysFor(test.people.admin)).toEqual(['annex', 'larkhaven'])
    expect(await keysFor(test.people.engineer)).toEqual(['larkhaven'])
    expect(await keysFor(test.people.stranger)).toEqual([])
    const { body } = await test.people.engineer
      .post('/v1/systems/larkhaven/keys')
      .send({ name: 'Pipeline', scopes: ['themes:read'] })
      .expect(201)
    expect(await keysFor(test.withKey(body.key))).toEqual(['larkhaven'])
  })

  it('answers each system as its own address does', async () => {
    const { body } = await test.people.admin.get('/v1/systems')
    for (const item of body.items) {
      const { body: one } = await test.people.admin.get(`/v1/systems/${item.key}`)
      expect(item).toEqual(one)
    }
  })

  it('refuses whoever is not signed in', async () => {
    await test.anonymous.get('/v1/systems').expect(401)
  })
})
