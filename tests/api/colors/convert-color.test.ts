import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/convert').send(body)

describe('convertColor', () => {
  it('answers a colour in every space, and as it ships', async () => {
    const { body } = await post({ color: '#ff0000' }).expect(200)
    expect(body.shipped).toMatchObject({ hex: '#ff0000', gamut: 'srgb', hsv: [0, 100, 100] })
    // WCAG 2.2, relative luminance, and ITU-R BT.601-7: the weight of red.
    expect(body.shipped.relativeLuminance).toBeCloseTo(0.2126, 6)
    expect(body.shipped.lumaBt601.luma).toBeCloseTo(0.299, 6)
    expect(body.srgb[0]).toBeCloseTo(1, 6)
    expect(body.xyzD65[1]).toBeCloseTo(0.2126, 3)
  })

  it('answers components missing where they mean nothing, and a colour beyond sRGB by what ships', async () => {
    const grey = await post({ color: 'oklch(0.5 0 none)' }).expect(200)
    expect([grey.body.oklch[2], grey.body.lch[2], grey.body.shipped.hsl[0]]).toEqual([
      null,
      null,
      null,
    ])
    const wide = await post({ color: 'oklch(0.7 0.4 150)' }).expect(200)
    expect(wide.body.shipped).toMatchObject({ hex: '#00c248', gamut: 'beyond' })
    expect(Math.min(...wide.body.srgb)).toBeLessThan(0)
  })

  it('answers a colour object as it answers the same colour in CSS', async () => {
    const color = { colorSpace: 'oklch', components: [0.585, 0.128, 243], alpha: 0.5 }
    const object = await post({ color }).expect(200)
    const css = await post({ color: 'oklch(0.585 0.128 243 / 0.5)' }).expect(200)
    expect(object.body).toEqual(css.body)
    expect(object.body.shipped.hex).toBe('#2283c180')
  })

  it.each([
    ['calc(1)', 'math'],
    ['currentcolor', 'a context'],
    ['rgb(from red r g b)', 'a relative colour'],
    ['oklch(NaN 0 0)', 'no number'],
    ['oklch(Infinity 0 0)', 'no finite number'],
    ['notacolour', 'no colour'],
    ['', 'nothing'],
  ])('refuses %s: it is %s', async (color) => {
    const { body } = await post({ color }).expect(422)
    expect(body.errors[0].pointer).toBe('/color')
  })

  it.each([
    ['a text', 'oklch(0.5 1e308 20)'],
    ['an object', { colorSpace: 'oklch', components: [0.5, 1e308, 20] }],
  ])('answers a chroma that other spaces cannot hold, as %s', async (_, color) => {
    const { body } = await post({ color }).expect(200)
    expect(body.oklch).toEqual([0.5, 1e308, 20])
    expect(body.lab).toEqual([null, null, null])
    expect(body.shipped.gamut).toBe('beyond')
  })

  it('refuses an object out of its range, with where', async () => {
    const color = { colorSpace: 'oklch', components: [1.2, -1, 400] }
    const { body } = await post({ color }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/color/components/0',
      '/color/components/1',
      '/color/components/2',
    ])
  })

  it('refuses whoever is not known, and answers any credential', async () => {
    await test.anonymous.post('/v1/colors/convert').send({ color: '#fff' }).expect(401)
    await test.people.stranger.post('/v1/colors/convert').send({ color: '#fff' }).expect(200)
  })
})
