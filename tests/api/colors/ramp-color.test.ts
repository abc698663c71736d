import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/ramp').send(body)
type Step = { hex: string; ratio: number; short?: boolean }

describe('rampColor', () => {
  it('answers the greys that have 3, 4.5 and 7 on white, none under its ratio', async () => {
    const { body } = await post({ seed: '#888', ground: '#fff', ratios: [3, 4.5, 7] }).expect(200)
    expect(body.steps.map(({ hex }: Step) => hex)).toEqual(['#949494', '#767676', '#595959'])
    for (const { ratio, wanted } of body.steps) expect(ratio).toBeGreaterThanOrEqual(wanted)
  })

  it('answers even lightness, both ends included', async () => {
    const lightness = { steps: 3, from: 0, to: 1 }
    const { body } = await post({ seed: '#369', ground: '#fff', lightness }).expect(200)
    expect(body.steps).toHaveLength(3)
    expect([body.steps[0].hex, body.steps[2].hex]).toEqual(['#000000', '#ffffff'])
  })

  it('answers what is out of reach as short', async () => {
    const { body } = await post({ seed: '#888', ground: '#777', ratios: [20] }).expect(200)
    expect(body.steps[0]).toMatchObject({ short: true, wanted: 20 })
  })

  it.each([
    [{ ratios: [] }, '/ratios'],
    [{ ratios: [0.5] }, '/ratios/0'],
    [{}, ''],
    [{ ratios: [3], lightness: { steps: 2, from: 0, to: 1 } }, ''],
    [{ lightness: { steps: 1, from: 0, to: 1 } }, '/lightness/steps'],
    [{ ratios: [3], ground: '#ffffff80' }, '/ground'],
  ])('refuses %j at "%s"', async (members, pointer) => {
    const { body } = await post({ seed: '#888', ground: '#fff', ...members }).expect(422)
    expect(body.errors[0].pointer).toBe(pointer)
  })
})
