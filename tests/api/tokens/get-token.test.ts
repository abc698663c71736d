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

const at = (name: string) => `${system.url}/tokens/${encodeURIComponent(name)}`

describe('getToken', () => {
  it('answers 304 to whoever has it already, and 200 once it has changed', async () => {
    const first = await test.people.engineer.get(at('paper')).expect(200)
    const again = () =>
      test.people.engineer.get(at('paper')).set('If-None-Match', String(first.headers.etag))
    const same = await again().expect(304)
    expect(same.headers.etag).toBe(first.headers.etag)
    await system.editToken('paper', { description: 'Undyed' })
    await again().expect(200)
  })

  it('answers another etag when a token that it follows has moved', async () => {
    await system.addToken('page', '{paper}')
    const before = await test.people.engineer.get(at('page')).expect(200)
    await system.editToken('paper', { value: '#fafafa' })
    const after = await test.people.engineer.get(at('page')).expect(200)
    expect(after.headers.etag).not.toBe(before.headers.etag)
    expect(after.body.resolved.light.rest.hex).toBe('#fafafa')
  })

  it.each(['two words', 'a/b', '100%', 'pct%2Fed', 'swatch 🎨', 'q?x=1', 'a#b', 'a+b', "o'clock"])(
    'answers the token named %j',
    async (name) => {
      await system.addToken(name, '#123456')
      const { body } = await test.people.engineer.get(at(name)).expect(200)
      expect(body.name).toBe(name)
      await test.people.engineer.get(at(`${name} `)).expect(404)
    },
  )

  it.each(['__proto__', 'constructor', 'a.__proto__.b'])(
    'answers the token named %s also in a theme, its file and the whole revision',
    async (name) => {
      const other = await createSampleSystem(test)
      const values = { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } }
      await other.putTheme('dark', { name: 'Dark', ground: 'paper', ink: 'ink', values })
      await other.addToken(name, '#123456', { values: { dark: { rest: '#abcdef' } } })
      const { body } = await test.people.engineer
        .get(`${other.url}/tokens/${encodeURIComponent(name)}`)
        .expect(200)
      expect(body.resolved.dark.rest.hex).toBe('#abcdef')
      const theme = await test.people.engineer.get(`${other.url}/themes/dark`).expect(200)
      expect(Object.keys(theme.body.values)).toContain(name)
      const file = await test.people.engineer.get(`${other.url}/themes/dark.json`).expect(200)
      expect(file.text).toContain('#abcdef')
      const { body: revisions } = await test.people.engineer.get(`${other.url}/revisions?limit=1`)
      const at = `${other.url}/revisions/${revisions.items[0].number}`
      expect((await test.people.engineer.get(at).expect(200)).text).toContain(name)
    },
  )

  it('answers names with dots as one name, exactly', async () => {
    await system.addToken('Chart.Route.1', '#123456')
    await test.people.engineer.get(at('Chart.Route.1')).expect(200)
    await test.people.engineer.get(at('chart.route.1')).expect(404)
    await test.people.engineer.get(at('Chart')).expect(404)
  })

  it('refuses a stranger as if nothing were there', async () => {
    await test.people.stranger.get(at('paper')).expect(404)
  })
})
