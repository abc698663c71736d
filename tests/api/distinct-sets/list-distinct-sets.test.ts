import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { compose } from '#api/compose.ts'
import { stateDigest } from '#api/features/revisions/state-digest.ts'
import { createTestApp, type TestApp, testConfig } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const url = () => `${system.url}/distinct-sets`
const list = async () => (await system.maintainer.get(url()).expect(200)).body.items
const make = async (name: string) =>
  (
    await system.maintainer
      .post(url())
      .send({ name, tokens: ['ink', 'paper'] })
      .expect(201)
  ).body

describe('listDistinctSets', () => {
  it('answers them in the order they were made, also after edits and in another process', async () => {
    expect(await list()).toEqual([])
    const first = await make('Zones')
    await make('Areas')
    const patch = system.maintainer.patch(`${url()}/${first.id}`).set('If-Match', first.etag)
    await patch.send({ name: 'Bands' }).expect(200)
    await system.editToken('ink', { name: 'text' })
    expect(await list()).toMatchObject([
      { name: 'Bands', tokens: ['text', 'paper'] },
      { name: 'Areas', tokens: ['text', 'paper'] },
    ])
    const { body } = await system.maintainer.get(system.url).expect(200)
    const kept = await test.services.heads.current(body.id)
    const fresh = compose({ config: testConfig(test.database.serveUrl) })
    const head = await fresh.services.heads.current(body.id)
    await fresh.close()
    expect(head.model).toEqual(kept.model)
    const { body: revision } = await system.maintainer
      .get(`${system.url}/revisions/${body.head.revision}`)
      .expect(200)
    expect(revision.digest).toBe(stateDigest(head.model))
  })

  it('answers 304 for the same list', async () => {
    const { headers } = await system.maintainer.get(url()).expect(200)
    await system.maintainer.get(url()).set('If-None-Match', String(headers.etag)).expect(304)
  })
})
