import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('soft', '#999999')
  await system.addToken('note', '{soft}')
  await system.addPair({ foreground: 'note', background: 'paper', use: 'text' })
})
afterAll(() => test.close())

const post = (name: string, body: object = {}) =>
  test.people.engineer.post(`${system.url}/tokens/${name}/nearest-passing`).send(body)

describe('nearestPassing', () => {
  it('answers the nearest colour for what follows the token, and writes nothing', async () => {
    const before = await system.maintainer.get(system.url).expect(200)
    const { body } = await post('soft').expect(200)
    expect(body).toMatchObject({ outcome: 'found', side: 'own', stopped: false })
    expect(body.edits).toHaveLength(1)
    expect(body.edits[0]).toMatchObject({
      token: 'soft',
      theme: 'light',
      state: 'rest',
      source: true,
      hex: '#767676',
    })
    expect(body.breaches[0]).toMatchObject({ foreground: 'note', outcome: 'breach' })
    const after = await system.maintainer.get(system.url).expect(200)
    expect(after.body).toEqual(before.body)
  })

  it('answers a colour that the head takes, after which nothing breaches', async () => {
    const { body } = await post('soft').expect(200)
    const check = await system.check({
      tokens: { soft: { $type: 'color', $value: body.edits[0].color } },
    })
    expect(check.verdict).toBe('pass')
  })

  it('answers the other side where the token is locked, and passing where nothing breaches', async () => {
    await system.addToken('held', '#aaaaaa', { locked: true })
    await system.addToken('tile', '#ffffff')
    await system.addPair({ foreground: 'held', background: 'tile', use: 'text' })
    const held = await post('held').expect(200)
    expect(held.body).toMatchObject({ outcome: 'found', side: 'other' })
    expect(held.body.edits[0].token).toBe('tile')
    expect((await post('ink').expect(200)).body).toMatchObject({ outcome: 'passing', edits: [] })
  })

  it('answers what cannot hold together', async () => {
    await system.addToken('label', '#ffffff', { locked: true })
    await system.addToken('fill', '#777777')
    await system.addToken('deck', '#3a3a3a', { locked: true })
    await system.addPair({ foreground: 'label', background: 'fill', use: 'text' })
    await system.addPair({ foreground: 'fill', background: 'deck', use: 'text' })
    const { body } = await post('fill').expect(200)
    expect(body.outcome).toBe('none')
    expect(body.conflict.requirements).toHaveLength(2)
    expect(body.conflict.bound.needed).toBe(20.25)
  })

  it('answers that it stopped where the budget runs out', async () => {
    await system.addToken('tinted', 'oklch(0.85 0.12 150)')
    await system.addPair({ foreground: 'tinted', background: 'paper', use: 'text' })
    const { body } = await post('tinted', { budget: 100 }).expect(200)
    expect(body.stopped).toBe(true)
  })

  it('refuses a token that is not there, and a budget that is none', async () => {
    await post('gone').expect(404)
    const { body } = await post('soft', { budget: 1 }).expect(422)
    expect(body.errors[0].pointer).toBe('/budget')
    await test.people.stranger
      .post(`${system.url}/tokens/soft/nearest-passing`)
      .send({})
      .expect(404)
  })
})
