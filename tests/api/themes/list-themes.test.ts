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

describe('listThemes', () => {
  it('answers the base first, then in the order of making, each as its own address does', async () => {
    const values = { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } }
    for (const key of ['kiosk', 'dark', 'crew']) {
      await system.putTheme(key, { name: key, ground: 'paper', ink: 'ink', values })
    }
    await system.removeTheme('dark')
    const { body } = await test.people.engineer.get(`${system.url}/themes`).expect(200)
    expect(
      body.items.map(({ key, position }: { key: string; position: number }) => [key, position]),
    ).toEqual([
      ['light', 0],
      ['kiosk', 1],
      ['crew', 2],
    ])
    for (const theme of body.items) {
      const { body: one } = await test.people.engineer.get(`${system.url}/themes/${theme.key}`)
      expect(theme).toEqual(one)
    }
  })

  it('answers none for a new system', async () => {
    const { body } = await test.people.engineer.get('/v1/systems/larkhaven/themes').expect(200)
    expect(body.items).toEqual([])
  })
})
