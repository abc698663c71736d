import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
})
beforeEach(async () => {
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const DARK = {
  name: 'Dark',
  ground: 'paper',
  ink: 'ink',
  rule: { kind: 'mirror', chroma: 0.9 },
  values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
}
const at = (key: string) => `${system.url}/themes/${key}`
const create = (key: string, body: object, agent = system.maintainer) =>
  agent.put(at(key)).set('If-None-Match', '*').send(body)
const replace = async (key: string, body: object, agent = system.maintainer) => {
  const { headers } = await system.maintainer.get(at(key)).expect(200)
  return agent.put(at(key)).set('If-Match', String(headers.etag)).send(body)
}

describe('putTheme', () => {
  it('answers the theme made, at the end, its values on the tokens', async () => {
    const { body, headers } = await create('dark', DARK).expect(201)
    expect(headers.location).toBe(at('dark'))
    expect(headers.etag).toBe(body.etag)
    expect(body).toMatchObject({
      key: 'dark',
      position: 1,
      from: 'light',
      gating: true,
      rule: DARK.rule,
      effect: { verdict: 'pass' },
    })
    const { body: token } = await system.maintainer.get(`${system.url}/tokens/paper`)
    expect(token.values).toEqual({ dark: body.values.paper })
    expect(token.resolved.dark.rest).toMatchObject({
      hex: '#0b1220',
      provenance: { from: 'override' },
    })
    const { body: read } = await system.maintainer.get(at('dark'))
    const { effect: _, ...theme } = body
    expect(read).toEqual(theme)
  })

  it('makes one revision of all that it edits', async () => {
    const { body } = await create('dark', DARK).expect(201)
    const { body: revision } = await system.maintainer.get(
      `${system.url}/revisions/${body.effect.revision}`,
    )
    const edits = revision.edits.map(
      ({ item, operation, name }: Record<string, string>) => `${operation} ${item} ${name}`,
    )
    expect(edits.sort()).toEqual(['added theme dark', 'edited token ink', 'edited token paper'])
  })

  it('answers a replacement that no longer sets what it does not name', async () => {
    await system.addToken('accent', '#ff0000')
    await create('dark', { ...DARK, values: { ...DARK.values, accent: { rest: '#aa0000' } } })
    const { body, status, headers } = await replace('dark', { ...DARK, name: 'Night' })
    // RFC 9110, 9.3.4: 201 for what was not there, 200 for what was.
    expect([status, headers.location]).toEqual([200, undefined])
    expect(body.name).toBe('Night')
    expect(Object.keys(body.values).sort()).toEqual(['ink', 'paper'])
    const { body: token } = await system.maintainer.get(`${system.url}/tokens/accent`)
    expect(token.values).toEqual({})
    expect(token.resolved.dark.rest.provenance.from).toBe('theme-rule')
  })

  it('refuses to make what is there, and to replace what is not', async () => {
    // RFC 9110, 13.1.1 and 13.1.2: both conditions are false.
    const there = await create('light', { name: 'L', ground: 'paper', ink: 'ink' }).expect(412)
    expect(there.body.current.key).toBe('light')
    const absent = await system.maintainer.put(at('dark')).set('If-Match', '*').send(DARK)
    expect([absent.status, absent.body.current]).toEqual([412, null])
    await system.maintainer.put(at('dark')).send(DARK).expect(428)
    await system.maintainer.put(at('light')).set('If-Match', '"old"').send(DARK).expect(412)
  })

  it('refuses a theme that does not set its own ground and ink', async () => {
    const { body } = await create('dark', { ...DARK, values: { ink: { rest: '#fff' } } }).expect(
      422,
    )
    expect(body.type).toBe('/problems/system-unresolvable')
    expect(body.errors[0]).toMatchObject({ pointer: '/values', code: 'theme-unset' })
  })

  it('refuses a ground and ink under 4.5 to 1, and a lower level', async () => {
    const close = { paper: { rest: '#0b1220' }, ink: { rest: '#333333' } }
    const span = await create('dark', { ...DARK, values: close }).expect(422)
    expect(span.body.errors).toMatchObject([{ pointer: '/ground', code: 'theme-span' }])
    await system.patchSettings({ level: 'AAA' })
    const lower = await create('dark', { ...DARK, level: 'AA' }).expect(422)
    expect(lower.body.errors).toMatchObject([{ pointer: '/level', code: 'level-lower' }])
  })

  it('refuses unknown names and a rest value of the base, each with its pointer', async () => {
    const { body } = await create('dark', {
      ...DARK,
      from: 'dusk',
      ground: 'no.ground',
      rule: { kind: 'match-contrast', against: '{nothing}' },
      values: { ...DARK.values, 'a/b': { rest: '{gone}' } },
    }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/from',
      '/ground',
      '/rule/against',
      '/values/a~1b',
      '/values/a~1b/rest',
    ])
    const base = await replace('light', {
      name: 'Light',
      from: 'light',
      ground: 'paper',
      ink: 'ink',
      values: { paper: { rest: '#fff' } },
    })
    expect(base.body.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
      '/from',
      '/values/paper/rest',
    ])
  })

  it('refuses parents that lead back to themselves', async () => {
    await create('dark', DARK).expect(201)
    await create('night', { ...DARK, from: 'dark' }).expect(201)
    const { status, body } = await replace('dark', { ...DARK, from: 'night' })
    expect(status).toBe(422)
    expect(body.errors[0]).toMatchObject({ pointer: '/from', code: 'theme-cycle' })
  })

  it('refuses a ninth theme', async () => {
    for (let made = 1; made < 8; made += 1) await create(`t${made}`, DARK).expect(201)
    await create('ninth', DARK).expect(422)
  })

  it('refuses to move a locked token', async () => {
    await system.editToken('paper', { locked: true })
    const { body } = await create('dark', DARK).expect(409)
    expect(body).toMatchObject({ type: '/problems/token-locked', detail: 'Locked: paper' })
  })

  it('refuses the lead all but level and gating', async () => {
    await create('dark', DARK, test.people.lead).expect(403)
    await create('dark', DARK).expect(201)
    const gates = await replace('dark', { ...DARK, gating: false, level: 'AAA' }, test.people.lead)
    expect(gates.body).toMatchObject({ gating: false, level: 'AAA' })
    const named = await replace('dark', { ...DARK, name: 'Other' }, test.people.lead)
    expect(named.status).toBe(403)
  })
})
