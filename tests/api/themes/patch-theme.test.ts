import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('accent', '#ff0000')
  await system.putTheme('dark', {
    name: 'Dark',
    ground: 'paper',
    ink: 'ink',
    rule: { kind: 'mirror' },
    values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
  })
})
afterAll(() => test.close())

const url = () => `${system.url}/themes/dark`
const patch = async (body: object, agent = system.maintainer) => {
  const { headers } = await system.maintainer.get(url()).expect(200)
  return agent.patch(url()).set('If-Match', String(headers.etag)).send(body)
}

describe('patchTheme', () => {
  it('leaves what the body does not name; a token in values replaces, null takes away', async () => {
    const set = await patch({ values: { accent: { rest: '#aa0000', hover: '#880000' } } })
    expect(Object.keys(set.body.values).sort()).toEqual(['accent', 'ink', 'paper'])
    expect(set.body).toMatchObject({ name: 'Dark', rule: { kind: 'mirror' } })
    const replaced = await patch({ values: { accent: { rest: '#990000' } } })
    expect(Object.keys(replaced.body.values.accent)).toEqual(['rest'])
    const taken = await patch({ values: { accent: null } })
    expect(Object.keys(taken.body.values).sort()).toEqual(['ink', 'paper'])
  })

  it('answers the breaches that a rule opens', async () => {
    await system.addToken('note', '#555555')
    await system.addPair({ foreground: 'note', background: 'paper', use: 'text' })
    const kept = await patch({ rule: { kind: 'keep' } })
    expect(kept.body.effect).toMatchObject({ verdict: 'fail', opened: [{ theme: 'dark' }] })
    const reported = await patch({ gating: false }, test.people.lead)
    expect(reported.body.effect.verdict).toBe('pass')
    const mirrored = await patch({ rule: { kind: 'mirror' }, gating: true })
    expect(mirrored.body.effect).toMatchObject({ verdict: 'pass', resolved: [{ theme: 'dark' }] })
  })

  it('leaves the revision where nothing changes', async () => {
    const { body } = await patch({ name: 'Dark', values: { ink: { rest: '#ffffff' } } })
    const { body: head } = await system.maintainer.get(system.url)
    const again = await patch({})
    expect(again.body.effect.revision).toBe(body.effect.revision)
    expect(head.head.revision).toBe(body.effect.revision)
  })

  it('refuses the lead all but level and gating', async () => {
    const leveled = await patch({ level: 'AAA' }, test.people.lead)
    expect(leveled.body.level).toBe('AAA')
    expect((await patch({ level: null }, test.people.lead)).body).not.toHaveProperty('level')
    for (const body of [{ name: 'X' }, { rule: { kind: 'keep' } }, { values: { ink: null } }]) {
      expect((await patch(body, test.people.lead)).status).toBe(403)
    }
  })

  it('refuses to leave a theme without its own ground', async () => {
    const { status, body } = await patch({ values: { paper: null } })
    expect([status, body.errors[0].code]).toEqual([422, 'theme-unset'])
  })

  it('refuses an edit without, and with a stale If-Match', async () => {
    await system.maintainer.patch(url()).send({ name: 'X' }).expect(428)
    const stale = await system.maintainer.patch(url()).set('If-Match', '"old"').send({ name: 'X' })
    expect([stale.status, stale.body.current.name]).toEqual([412, 'Dark'])
  })
})
