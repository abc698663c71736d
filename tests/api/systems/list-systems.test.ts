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
    await test.withKey(body.key).get('/v1/systems/larkhaven').expect(200)
  })

  it.each(['checks:write', 'tokens:write'])(
    'leaves out the system of a key that may not read it: %s',
    async (scope) => {
      const { body } = await test.people.maintainer
        .post('/v1/systems/larkhaven/keys')
        .send({ name: 'Pipeline', scopes: [scope] })
        .expect(201)
      const key = test.withKey(body.key)
      expect((await key.get('/v1/systems').expect(200)).body.items).toEqual([])
      await key.get('/v1/systems/larkhaven').expect(403)
    },
  )

  it('answers the key of an admin its own system, of which the admin is no member', async () => {
    const { body } = await test.people.admin
      .post('/v1/systems/annex/keys')
      .send({ name: 'Reader', scopes: ['themes:read'] })
      .expect(201)
    const { body: list } = await test.withKey(body.key).get('/v1/systems').expect(200)
    expect(list.items.map(({ key }: { key: string }) => key)).toEqual(['annex'])
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
