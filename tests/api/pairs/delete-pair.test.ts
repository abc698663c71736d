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

describe('deletePair', () => {
  it('leaves its breach resolved as pair-removed, and the declaration free', async () => {
    await system.addToken('grey', '#8a8a8a')
    const pair = { foreground: 'grey', background: 'paper', use: 'text' }
    const id = await system.addPair(pair)
    await system.removePair(id)
    await system.maintainer.get(`${system.url}/pairs/${id}`).expect(404)
    expect(await system.breaches('?status=resolved')).toMatchObject([
      { foreground: 'grey', closingReason: 'pair-removed' },
    ])
    expect(await system.addPair(pair)).not.toBe(id)
  })

  it('refuses the lead, and a missing or stale If-Match', async () => {
    const id = await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    const { body } = await system.maintainer.get(`${system.url}/pairs/${id}`)
    const url = `${system.url}/pairs/${id}`
    await test.people.lead.delete(url).set('If-Match', body.etag).expect(403)
    await system.maintainer.delete(url).expect(428)
    await system.maintainer.delete(url).set('If-Match', '"stale"').expect(412)
    await system.maintainer.get(url).expect(200)
  })
})
