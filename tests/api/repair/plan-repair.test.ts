import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  for (const [name, color] of [
    ['quay', '#8f8f8f'],
    ['rope', '{quay}'],
    ['buoy', '#bbbbbb'],
  ] as const) {
    await system.addToken(name, color)
    await system.addPair({ foreground: name, background: 'paper', use: 'text' })
  }
})
afterAll(() => test.close())

const plan = (body: object = {}) =>
  test.people.engineer.post(`${system.url}/repair-plan`).send(body)

describe('planRepair', () => {
  it('answers few edits after which a check of them passes, and writes nothing', async () => {
    const { body } = await plan().expect(200)
    expect(body).toMatchObject({ breachesBefore: 3, left: [], stopped: false })
    expect(body.after).toMatchObject({ verdict: 'pass', counts: { breach: 0 } })
    expect(body.edits.map(({ token }: { token: string }) => token)).toEqual(['quay', 'buoy'])
    const tokens = Object.fromEntries(
      body.edits.map(({ token, color }: { token: string; color: object }) => [
        token,
        { $type: 'color', $value: color },
      ]),
    )
    expect((await system.check({ tokens })).verdict).toBe('pass')
    expect((await system.check()).verdict).toBe('fail')
  })

  it('answers what it leaves and why where tokens are locked', async () => {
    await system.editToken('buoy', { locked: true })
    await system.addToken('mast', '#ffffff', { locked: true })
    await system.addPair({ foreground: 'buoy', background: 'mast', use: 'text' })
    const { body } = await plan().expect(200)
    const [left] = body.left.filter(
      ({ finding }: { finding: { background: string } }) => finding.background === 'mast',
    )
    expect(left).toMatchObject({ reason: 'locked', finding: { foreground: 'buoy' } })
    expect(body.after.verdict).toBe('fail')
  })

  it('answers a repetition with the same key as it did first', async () => {
    const ask = () => plan().set('Idempotency-Key', '"plan-once"')
    const first = await ask().expect(200)
    expect((await ask().expect(200)).body).toEqual(first.body)
  })

  it('refuses a budget that is none, and members it does not know', async () => {
    expect((await plan({ budget: 0 }).expect(422)).body.errors[0].pointer).toBe('/budget')
    await plan({ limit: 3 }).expect(422)
  })
})
