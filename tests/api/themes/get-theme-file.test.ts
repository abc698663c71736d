import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.patchSettings({ p3: true })
  await system.addToken('action.fill', 'oklch(0.7 0.4 150)', { states: ['hover'] })
  await system.addToken('veil', 'rgb(0 0 0 / 0.5)', { description: 'Over a picture' })
})
afterAll(() => test.close())

const get = (file: string) => test.people.engineer.get(`${system.url}/themes/${file}`)

describe('getThemeFile', () => {
  it('answers CSS with the hex of every state, and mapped P3 where it differs', async () => {
    const { text, headers } = await get('light.css').expect(200)
    expect(headers['content-type']).toBe('text/css; charset=utf-8')
    expect(headers['cache-control']).toContain('no-cache')
    // CSS Color 4, gamut mapping: the colour is mapped to #00c248, never clipped by the browser.
    expect(text).toContain('--action-fill: #00c248;')
    expect(text).toMatch(/--action-fill-hover: #[0-9a-f]{6};/)
    expect(text).toContain('--veil: #00000080;')
    expect(text).toMatch(
      /@media \(color-gamut: p3\) \{\s+:root \{\s+--action-fill: color\(display-p3/,
    )
  })

  it('answers a DTCG document at rest, with the same hexes as the tokens', async () => {
    const { text, headers } = await get('light.json').expect(200)
    expect(headers['content-type']).toContain('application/design-tokens+json')
    const document = JSON.parse(text)
    expect(document.action.fill.$value.hex).toBe('#00c248')
    expect(document.veil).toMatchObject({
      $description: 'Over a picture',
      $value: { colorSpace: 'srgb', components: [0, 0, 0], alpha: 128 / 255 },
    })
  })

  it('leaves P3 out where the system does not ship it, since it is not measured', async () => {
    await system.patchSettings({ p3: false })
    const { text } = await get('light.css').expect(200)
    expect(text).toContain('--action-fill: #00c248;')
    expect(text).not.toContain('p3')
    await system.patchSettings({ p3: true })
    expect((await get('light.css').expect(200)).text).toContain('color(display-p3')
  })

  it('answers 304 until a colour of the theme moves', async () => {
    const { headers } = await get('light.css')
    const again = () => get('light.css').set('If-None-Match', String(headers.etag))
    await again().expect(304)
    await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    await again().expect(304)
    await system.editToken('veil', { value: 'rgb(0 0 0 / 0.6)' })
    await again().expect(200)
  })

  it('refuses two names that come to one property, and names both', async () => {
    await system.addToken('a-b', '#123456')
    await system.addToken('a.b', '#123456')
    const { body } = await get('light.css').expect(409)
    expect(body.type).toBe('/problems/css-name-collision')
    expect(body.detail).toContain('a-b and a.b')
    await get('light.json').expect(200)
  })

  it.each(['light.pdf', 'light.css.map', 'none.css', 'light.'])('refuses %s', async (file) => {
    await get(file).expect(404)
  })
})
