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

const post = (body: object, agent = system.maintainer) =>
  agent.post(`${system.url}/distinct-sets`).send(body)

describe('createDistinctSet', () => {
  it('answers the set as one revision, which says so and can be read back', async () => {
    const { body, headers } = await post({
      name: 'Series',
      tokens: ['ink', 'paper'],
      message: 'Told apart',
    }).expect(201)
    expect(body).toMatchObject({ name: 'Series', tokens: ['ink', 'paper'] })
    expect(body.id).toMatch(/^dst_/)
    expect(headers.location).toBe(`${system.url}/distinct-sets/${body.id}`)
    expect(headers.etag).toBe(body.etag)
    const { body: revision } = await system.maintainer
      .get(`${system.url}/revisions/${body.effect.revision}`)
      .expect(200)
    expect(revision).toMatchObject({
      message: 'Told apart',
      edits: [{ item: 'distinct-set', operation: 'added', id: body.id, name: 'Series' }],
      distinctSets: [{ id: body.id, name: 'Series', tokens: ['ink', 'paper'] }],
    })
  })

  it('refuses every token that is not there or there twice, each with its pointer', async () => {
    const { body } = await post({ name: 'Wrong', tokens: ['ink', 'one', 'ink', 'two'] }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/tokens/1',
      '/tokens/2',
      '/tokens/3',
    ])
  })

  it('refuses a set of one, and a name that is taken', async () => {
    const { body: one } = await post({ name: 'One', tokens: ['ink'] }).expect(422)
    expect(one.errors[0].pointer).toBe('/tokens')
    await post({ name: 'Taken', tokens: ['ink', 'paper'] }).expect(201)
    const { body: taken } = await post({ name: ' Taken ', tokens: ['paper', 'ink'] }).expect(409)
    expect(taken.type).toBe('/problems/distinct-set-name-taken')
  })

  it('refuses the lead, who edits exemptions, levels and gating alone', async () => {
    const body = { name: 'Leads', tokens: ['ink', 'paper'] }
    expect((await post(body, test.people.lead)).body.type).toBe('/problems/role-missing')
  })

  it('refuses it under review', async () => {
    const reviewed = await createSampleSystem(test)
    await reviewed.patchSettings({ writeMode: 'review' })
    const { body } = await reviewed.maintainer
      .post(`${reviewed.url}/distinct-sets`)
      .send({ name: 'Series', tokens: ['ink', 'paper'] })
      .expect(409)
    expect(body.type).toBe('/problems/review-required')
  })
})
