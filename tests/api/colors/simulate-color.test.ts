import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object) => test.people.engineer.post('/v1/colors/simulate').send(body)

describe('simulateColor', () => {
  it('answers red for protan in linear light, and names how', async () => {
    const { body } = await post({ color: '#ff0000', deficiency: 'protan' }).expect(200)
    // Machado 2009 at severity 1 on linear sRGB; on gamma-coded channels it would be #271d00.
    expect(body).toEqual({
      hex: '#ff0000',
      simulated: '#6d5f00',
      deficiency: 'protan',
      severity: 1,
      model: 'machado-2009',
    })
  })

  it('leaves a colour as it is at severity 0, and alpha at any', async () => {
    const none = await post({ color: '#3366cc', deficiency: 'tritan', severity: 0 }).expect(200)
    expect(none.body.simulated).toBe('#3366cc')
    const veil = await post({ color: '#ff000080', deficiency: 'protan' }).expect(200)
    expect(veil.body.simulated).toBe('#6d5f0080')
  })

  it.each([
    [{ severity: 1.2 }, '/severity'],
    [{ deficiency: 'mono' }, '/deficiency'],
    [{ model: 'vienot-1999', deficiency: 'tritan' }, '/model'],
    [{ model: 'vienot-1999', severity: 0.5 }, '/model'],
  ])('refuses %j at %s', async (members, pointer) => {
    const { body } = await post({ color: '#f00', deficiency: 'protan', ...members }).expect(422)
    expect(body.errors[0].pointer).toBe(pointer)
  })
})
