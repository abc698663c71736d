import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('grey', '#8a8a8a', { states: ['hover'] })
  await system.addToken('glass', 'rgb(0 0 0 / 0.4)')
})
afterAll(() => test.close())

const post = (body: object, agent = system.maintainer) =>
  agent.post(`${system.url}/pairs`).send(body)

describe('createPair', () => {
  it('answers the pair with the breaches that it opens', async () => {
    const { body, headers } = await post({
      foreground: 'grey',
      background: 'paper',
      use: 'text',
      message: 'Captions',
    }).expect(201)
    expect(body).toMatchObject({
      foreground: 'grey',
      background: 'paper',
      use: 'text',
      relation: 'inside',
      effect: { verdict: 'fail' },
    })
    expect(body.effect.opened.map(({ state }: { state: string }) => state).sort()).toEqual([
      'hover/rest',
      'rest/rest',
    ])
    expect(headers.etag).toBe(body.etag)
    const { body: read } = await system.maintainer.get(`${system.url}/pairs/${body.id}`)
    const { effect: _, ...pair } = body
    expect(read).toEqual(pair)
  })

  it('answers every member as it was given', async () => {
    const members = {
      foreground: 'ink',
      background: 'grey',
      use: 'large-text',
      relation: 'together',
      backdrop: ['glass', 'paper'],
      states: ['rest', 'hover'],
      themes: ['light'],
      level: 'AAA',
      minimum: 5,
      anyOf: 'ring',
      product: 'kiosk',
    }
    const { body } = await post(members).expect(201)
    expect(body).toMatchObject(members)
    const alone = { ...members, anyOf: 'band', backdrop: 'unknown' }
    const unknown = await post(alone).expect(201)
    expect(unknown.body.backdrop).toBe('unknown')
  })

  it('refuses the same declaration a second time; what only qualifies it makes no other', async () => {
    const declared = { foreground: 'ink', background: 'paper', use: 'text' }
    await post(declared).expect(201)
    for (const qualified of [{}, { level: 'AAA' }, { minimum: 9 }, { states: ['rest'] }]) {
      const { body } = await post({ ...declared, ...qualified }).expect(409)
      expect(body.type).toBe('/problems/pair-already-declared')
    }
    for (const another of [
      { use: 'non-text' },
      { relation: 'together' },
      { product: 'tablet' },
      { anyOf: 'strip' },
      { backdrop: ['grey'] },
    ]) {
      await post({ ...declared, ...another }).expect(201)
    }
  })

  it('refuses every name that is not there, each with its pointer', async () => {
    const { body } = await post({
      foreground: 'one',
      background: 'two',
      use: 'text',
      backdrop: ['paper', 'three'],
      themes: ['light', 'dusk'],
    }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/foreground',
      '/background',
      '/backdrop/1',
      '/themes/1',
    ])
  })

  it('refuses a minimum under the required ratio', async () => {
    const { body } = await post({
      foreground: 'glass',
      background: 'paper',
      use: 'text',
      minimum: 3,
    }).expect(422)
    expect(body.type).toBe('/problems/system-unresolvable')
    expect(body.errors).toMatchObject([{ pointer: '/minimum', code: 'minimum-lower' }])
  })

  it('refuses an exemption by a maintainer and a plain declaration by the lead', async () => {
    const exempt = { kind: 'logotype', reason: 'The line of the name' }
    const logotype = { foreground: 'glass', background: 'grey', use: 'text' }
    const byMaintainer = await post({ ...logotype, exempt }).expect(403)
    expect(byMaintainer.body.detail).toContain('accessibility-lead')
    const byLead = await post(logotype, test.people.lead).expect(403)
    expect(byLead.body.detail).toContain('maintainer')
    const { body } = await post({ ...logotype, exempt }, test.people.lead).expect(201)
    expect(body).toMatchObject({ exempt, effect: { opened: [] } })
    await post({ ...logotype, product: 'kiosk' }, test.people.engineer).expect(403)
  })
})
