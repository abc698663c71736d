import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let id: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('third', '#777777')
  const made = await system.maintainer
    .post(`${system.url}/distinct-sets`)
    .send({ name: 'Series', tokens: ['ink', 'paper'] })
    .expect(201)
  id = made.body.id
})
afterAll(() => test.close())

const url = () => `${system.url}/distinct-sets/${id}`
const patch = async (body: object) => {
  const { headers } = await system.maintainer.get(url()).expect(200)
  return system.maintainer.patch(url()).set('If-Match', String(headers.etag)).send(body)
}

describe('patchDistinctSet', () => {
  it('leaves what the body does not name; fewer tokens are nobody else’s to approve', async () => {
    expect((await patch({ tokens: ['third', 'paper', 'ink'] })).body).toMatchObject({
      name: 'Series',
      tokens: ['third', 'paper', 'ink'],
    })
    const { status, body } = await patch({ name: 'Lines' })
    expect([status, body.tokens]).toEqual([200, ['third', 'paper', 'ink']])
    expect((await patch({ tokens: ['third', 'ink'] })).status).toBe(200)
  })

  it('leaves the revision where nothing changes', async () => {
    const { body: before } = await patch({ tokens: ['ink', 'third'] })
    const { body } = await patch({ tokens: ['ink', 'third'], name: before.name })
    expect(body.effect.revision).toBe(before.effect.revision)
  })

  it('refuses the name of another, and an edit without or with a stale If-Match', async () => {
    const sets = `${system.url}/distinct-sets`
    await system.maintainer
      .post(sets)
      .send({ name: 'Status', tokens: ['ink', 'paper'] })
      .expect(201)
    const { status, body } = await patch({ name: 'Status' })
    expect([status, body.type]).toEqual([409, '/problems/distinct-set-name-taken'])
    await system.maintainer.patch(url()).send({ name: 'X' }).expect(428)
    const stale = await system.maintainer.patch(url()).set('If-Match', '"old"').send({ name: 'X' })
    expect([stale.status, stale.body.current.id]).toEqual([412, id])
  })
})
