import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('deck', '#ffffff', {
    states: ['hover'],
    values: { light: { hover: '#000000' } },
  })
  await system.addToken('loud', '#000000')
  await system.addToken('plain', '#767676')
  await system.addToken('faint', '#cccccc')
})
afterAll(() => test.close())

const usable = (query = '', name = 'deck') =>
  test.people.engineer.get(`${system.url}/tokens/${name}/usable-on${query}`)

describe('listUsableOn', () => {
  // WCAG 2.2: #767676 has 4.54 on white and 4.62 on black, #cccccc 1.61 on white.
  it('answers for what each token may stand in every state, and where it has least', async () => {
    const { body } = await usable().expect(200)
    const of = Object.fromEntries(body.items.map((item: { token: string }) => [item.token, item]))
    expect(of.plain.uses).toEqual(['text', 'large-text', 'non-text'])
    expect(of.loud).toMatchObject({
      uses: [],
      lowest: { theme: 'light', state: 'rest/hover', ratio: 1 },
    })
    expect(of).not.toHaveProperty('deck')
  })

  it('answers one state or one use alone', async () => {
    const names = async (query: string) =>
      (await usable(query).expect(200)).body.items.map(({ token }: { token: string }) => token)
    expect(await names('?state=rest&use=text&theme=light')).toEqual(['ink', 'loud', 'plain'])
    expect(await names('?use=text')).toEqual(['plain'])
  })

  it('answers 304 until a color moves', async () => {
    const { headers } = await usable().expect(200)
    const again = () => usable().set('If-None-Match', String(headers.etag))
    await again().expect(304)
    await system.editToken('faint', { value: '#cdcdcd' })
    await again().expect(200)
  })

  it('refuses a token and a theme that are not there, and a state that is none', async () => {
    await usable('', 'gone').expect(404)
    const { body } = await usable('?theme=gone').expect(400)
    expect(body.errors).toEqual([{ parameter: 'theme', detail: 'There is no theme gone' }])
    await usable('?state=pressed').expect(400)
  })
})
