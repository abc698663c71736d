import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let id: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('grey', '#8a8a8a')
  id = await system.addPair({ foreground: 'grey', background: 'paper', use: 'text' })
})
afterAll(() => test.close())

const read = async () => (await system.maintainer.get(`${system.url}/pairs/${id}`)).body
const patch = async (body: object, agent = system.maintainer) =>
  agent
    .patch(`${system.url}/pairs/${id}`)
    .set('If-Match', (await read()).etag)
    .send(body)

describe('patchPair', () => {
  it('answers the breach that a use of another ratio resolves', async () => {
    // #8a8a8a on white is 3.452: short of 4.5 for text, enough for large text (WCAG 2.2, 1.4.3).
    const { body } = await patch({ use: 'large-text' }, test.people.admin)
    expect(body.effect).toMatchObject({ verdict: 'pass', resolved: [{ foreground: 'grey' }] })
    await patch({ use: 'text' })
  })

  it('leaves what the body does not name, and removes what is null', async () => {
    const { admin } = test.people
    await patch({ product: 'kiosk', states: ['hover'], backdrop: ['ink'] }, admin)
    const { body } = await patch({ states: null, backdrop: null }, admin)
    expect(body).toMatchObject({ product: 'kiosk' })
    expect(body).not.toHaveProperty('states')
    expect(body).not.toHaveProperty('backdrop')
    await patch({ product: null })
  })

  it('leaves exemption and level to the lead, and the rest to the maintainer', async () => {
    const exempt = { kind: 'decorative', reason: 'A wave in the margin' }
    expect((await patch({ exempt })).status).toBe(403)
    const byLead = await patch({ exempt, level: 'AAA' }, test.people.lead)
    expect(byLead.body).toMatchObject({ exempt, level: 'AAA', effect: { verdict: 'pass' } })
    expect((await patch({ exempt: null })).status).toBe(403)
    const others = await patch({ use: 'non-text', level: null }, test.people.lead)
    expect([others.status, others.body.type]).toEqual([403, '/problems/role-missing'])
    expect((await patch({ exempt: null, level: null }, test.people.admin)).status).toBe(200)
  })

  it('refuses to become what another pair declares already', async () => {
    await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    const { status, body } = await patch({ foreground: 'ink' })
    expect([status, body.type]).toEqual([409, '/problems/pair-already-declared'])
  })

  it('refuses an edit without, and with a stale If-Match', async () => {
    await system.maintainer.patch(`${system.url}/pairs/${id}`).send({}).expect(428)
    const stale = await system.maintainer
      .patch(`${system.url}/pairs/${id}`)
      .set('If-Match', '"stale"')
      .send({ product: 'x' })
    expect(stale.status).toBe(412)
    expect(stale.body.current).toEqual(await read())
  })
})
