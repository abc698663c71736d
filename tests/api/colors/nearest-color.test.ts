import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/nearest-passing').send(body)

describe('nearestColor', () => {
  it('answers #767676 for a light grey on white at 4.5', async () => {
    const against = [{ color: '#ffffff', required: 4.5 }]
    const { body } = await post({ color: '#999999', against }).expect(200)
    expect(body).toMatchObject({ found: { hex: '#767676' }, conflict: [], stopped: false })
    expect(body.found.ratios[0]).toBeGreaterThanOrEqual(4.5)
  })

  it('answers which of the demands cannot be met together', async () => {
    const against = [
      { color: '#ffffff', required: 2 },
      { color: '#ffffff', required: 7 },
      { color: '#333333', required: 4.5 },
    ]
    const { body } = await post({ color: '#777', against }).expect(200)
    expect(body).toMatchObject({ found: null, conflict: [1, 2] })
  })

  it.each([
    [[], '/against'],
    [[{ color: '#fff', required: 22 }], '/against/0/required'],
    [[{ color: '#ffffff80', required: 3 }], '/against/0/color'],
    [[{ color: 'whitee', required: 3 }], '/against/0/color'],
  ])('refuses %j at %s', async (against, pointer) => {
    const { body } = await post({ color: '#777', against }).expect(422)
    expect(body.errors[0].pointer).toBe(pointer)
  })
})
