import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/contrast').send(body)

describe('contrastColors', () => {
  it('answers the ratio unrounded, and which requirements it meets', async () => {
    const { body } = await post({ foreground: '#767676', background: '#ffffff' }).expect(200)
    // w3c/wcag understanding/21/non-text-contrast.html
    expect(body.ratio).toBeCloseTo(4.542225, 6)
    const met = body.requirements.filter((one: { met: boolean }) => one.met)
    expect(met.map(({ use, level }: { use: string; level: string }) => `${use} ${level}`)).toEqual([
      'text AA',
      'large-text AA',
      'large-text AAA',
      'non-text AA',
      'non-text AAA',
    ])
  })

  it('answers 4.4999… as not met: nothing is rounded', async () => {
    const { body } = await post({ foreground: '#9a6c5a', background: '#ffffff' }).expect(200)
    expect(body.ratio).toBeLessThan(4.5)
    expect(body.ratio).toBeGreaterThan(4.4999)
    expect(body.requirements[0]).toMatchObject({ use: 'text', level: 'AA', met: false })
  })

  it('answers translucent layers composited on gamma-coded bytes', async () => {
    const { body } = await post({ foreground: 'rgb(0 0 0 / 0.54)', background: '#fff' }).expect(200)
    // Blending in linear light would give 2.06.
    expect(body.ratio).toBeCloseTo(4.61, 1)
    const layered = { foreground: '#fff', background: 'rgb(0 0 0 / 0.5)', ground: '#ffffff' }
    const over = await post(layered).expect(200)
    expect(over.body.background.hex).toBe('#7f7f7f')
  })

  it('answers 1 for a colour that cannot be seen', async () => {
    const { body } = await post({ foreground: '#12345600', background: '#fff' }).expect(200)
    expect(body.ratio).toBe(1)
  })

  it('refuses a translucent background without a ground, and a translucent ground', async () => {
    const bare = await post({ foreground: '#000', background: '#ffffff80' }).expect(422)
    expect(bare.body.errors[0].pointer).toBe('/background')
    const body = { foreground: '#000', background: '#fff', ground: '#ffffff80' }
    const ground = await post(body).expect(422)
    expect(ground.body.errors[0].pointer).toBe('/ground')
  })

  it('refuses every colour that is none at once', async () => {
    const { body } = await post({ foreground: 'inkk', background: 'paperr' }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/foreground',
      '/background',
    ])
  })
})
