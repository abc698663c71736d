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

describe('deleteDistinctSet', () => {
  it('leaves its tokens free to go, and its history to be read', async () => {
    await system.addToken('third', '#777777')
    const sets = `${system.url}/distinct-sets`
    const { body: made } = await system.maintainer
      .post(sets)
      .send({ name: 'Series', tokens: ['ink', 'third'] })
      .expect(201)
    const token = await system.maintainer.get(`${system.url}/tokens/third`).expect(200)
    const inUse = await system.maintainer
      .delete(`${system.url}/tokens/third`)
      .set('If-Match', String(token.headers.etag))
    expect([inUse.status, inUse.body.type]).toEqual([409, '/problems/token-in-use'])
    expect(inUse.body.detail).toContain('in distinct sets: Series')
    await system.maintainer.delete(`${sets}/${made.id}`).expect(428)
    await system.maintainer.delete(`${sets}/${made.id}`).set('If-Match', made.etag).expect(204)
    await system.maintainer.get(`${sets}/${made.id}`).expect(404)
    await system.removeToken('third')
    const { body: then } = await system.maintainer
      .get(`${system.url}/revisions/${made.effect.revision}`)
      .expect(200)
    expect(then.distinctSets).toMatchObject([{ name: 'Series', tokens: ['ink', 'third'] }])
    const { body: gone } = await system.maintainer
      .get(`${system.url}/revisions/${made.effect.revision + 1}`)
      .expect(200)
    expect(gone.edits).toMatchObject([{ item: 'distinct-set', operation: 'removed' }])
  })
})
