import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/mix').send(body)

describe('mixColor', () => {
  it('answers teal and olive in lch as CSS does', async () => {
    const { body } = await post({
      first: 'teal',
      second: 'olive',
      part: 0.35,
      space: 'lch',
    }).expect(200)
    // w3c/csswg-drafts@000ed544 css-color-5 example ex-mix-lch-teal65
    const [l, c, h] = body.mixed.components
    expect([l, c, h].map((one) => Math.round(one))).toEqual([49, 40, 163])
    expect(body.mixed.colorSpace).toBe('lch')
    expect(body.hex).toMatch(/^#[0-9a-f]{6}$/)
  })

  it('answers half of each in OKLab where nothing else is said', async () => {
    const { body } = await post({ first: '#ffffff', second: '#0000ff' }).expect(200)
    // web-platform-tests color-computed-color-mix-function.html
    expect(body.mixed.components[0]).toBeCloseTo(0.726, 2)
  })

  it('answers missing components as none, taking what one of both has', async () => {
    const both = { first: 'oklch(0.4 0 none)', second: 'oklch(0.6 0 none)', space: 'oklch' }
    const missing = await post(both).expect(200)
    expect(missing.body.mixed.components).toEqual([0.5, 0, 'none'])
    const one = { ...both, second: 'oklch(0.6 0.2 80)' }
    expect((await post(one).expect(200)).body.mixed.components[2]).toBe(80)
  })

  it('answers the hue the way round that is asked for', async () => {
    const ends = { first: 'oklch(0.6 0.1 30)', second: 'oklch(0.6 0.1 90)', space: 'oklch' }
    const hueBy = async (hue: string) =>
      Math.round((await post({ ...ends, hue }).expect(200)).body.mixed.components[2])
    expect([await hueBy('shorter'), await hueBy('longer')]).toEqual([60, 240])
  })

  it.each([
    [{ part: 1.01 }, '/part'],
    [{ part: 'half' }, '/part'],
    [{ space: 'cmyk' }, '/space'],
    [{ hue: 'nearest' }, '/hue'],
    [{ second: 'color-mix(in oklab, red, blue)' }, '/second'],
  ])('refuses %j at %s', async (members, pointer) => {
    const { body } = await post({ first: '#fff', second: '#000', ...members }).expect(422)
    expect(body.errors[0].pointer).toBe(pointer)
  })
})
