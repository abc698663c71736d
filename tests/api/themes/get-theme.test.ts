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

describe('getTheme', () => {
  it('answers the base, which derives from none, and 304 to whoever has it', async () => {
    const url = `${system.url}/themes/light`
    const { body, headers } = await test.people.engineer.get(url).expect(200)
    expect(body).toMatchObject({
      key: 'light',
      name: 'Light',
      position: 0,
      ground: 'paper',
      ink: 'ink',
      rule: { kind: 'keep' },
      gating: true,
      values: {},
    })
    expect(body).not.toHaveProperty('from')
    await test.people.engineer.get(url).set('If-None-Match', String(headers.etag)).expect(304)
  })

  it('refuses a key that is not there', async () => {
    await test.people.engineer.get(`${system.url}/themes/dusk`).expect(404)
  })
})
