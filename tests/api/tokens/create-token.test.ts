import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const post = (body: object) => system.maintainer.post(`${system.url}/tokens`).send(body)

describe('createToken', () => {
  it('answers the token, resolved, with its etag and the revision that it made', async () => {
    const { body, headers } = await post({
      name: 'action.fill',
      value: 'oklch(0.585 0.128 243)',
      states: ['disabled', 'hover', 'hover'],
      description: 'Board button',
    }).expect(201)
    expect(body).toMatchObject({
      name: 'action.fill',
      value: { colorSpace: 'oklch', components: [0.585, 0.128, 243], alpha: 1 },
      states: ['hover', 'disabled'],
      values: {},
      locked: false,
      description: 'Board button',
      effect: { verdict: 'pass', opened: [], resolved: [] },
    })
    expect(Object.keys(body.resolved.light)).toEqual(['rest', 'hover', 'disabled'])
    expect(body.resolved.light.rest.provenance.from).toBe('source')
    expect(body.resolved.light.hover.provenance.from).toBe('state-rule')
    expect(headers.etag).toBe(body.etag)
    const { body: read } = await system.maintainer.get(`${system.url}/tokens/action.fill`)
    const { effect, ...token } = body
    expect(read).toEqual(token)
    const { body: revision } = await system.maintainer.get(
      `${system.url}/revisions/${effect.revision}`,
    )
    expect(revision).toMatchObject({
      origin: 'direct',
      author: { name: 'Ines Marrow' },
      edits: [{ item: 'token', operation: 'added', name: 'action.fill' }],
    })
  })

  it('answers sRGB bytes and mapped P3 for what sRGB cannot hold', async () => {
    const { body } = await post({ name: 'beyond', value: 'oklch(0.7 0.4 150)' }).expect(201)
    // CSS Color 4, gamut mapping gives #00c248, where clipping would give #00d600.
    expect(body.resolved.light.rest).toMatchObject({ hex: '#00c248', gamut: 'beyond' })
    expect(body.resolved.light.rest.p3.colorSpace).toBe('display-p3')
  })

  it('answers with an alias and a derived token as they were given', async () => {
    const alias = await post({ name: 'alias', value: '{paper}' }).expect(201)
    expect(alias.body.value).toBe('{paper}')
    expect(alias.body.resolved.light.rest).toMatchObject({
      hex: '#ffffff',
      provenance: { from: 'alias', text: '{paper}' },
    })
    const value = { derive: '{paper}', lightness: -0.2, alpha: 0.5 }
    const derived = await post({ name: 'derived', value }).expect(201)
    expect(derived.body.value).toEqual(value)
    expect(derived.body.resolved.light.rest.hex).toMatch(/^#[0-9a-f]{6}80$/)
  })

  it('refuses every name that the system does not have, each with its pointer', async () => {
    const { body } = await post({
      name: 'faulty',
      value: { derive: '{nobody}' },
      values: { light: { hover: '{nowhere}' }, night: { rest: '#fff' } },
      rules: {
        states: { hover: { lightness: 0.1, away: '{gone}' } },
        themes: { dusk: { kind: 'match-contrast', against: '{lost}' } },
      },
      deprecated: { replacement: 'absent' },
    }).expect(422)
    expect(body.type).toBe('/problems/request-invalid')
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/deprecated/replacement',
      '/rules/states/hover/away',
      '/rules/themes/dusk',
      '/rules/themes/dusk/against',
      '/value/derive',
      '/values/light/hover',
      '/values/night',
    ])
  })

  it("refuses a rest override in the base theme: that is the token's value", async () => {
    const { body } = await post({
      name: 'doubled',
      value: '#fff',
      values: { light: { rest: '#000' } },
    }).expect(422)
    expect(body.errors).toMatchObject([{ pointer: '/values/light/rest' }])
  })

  it('refuses a name that another token has, also in another composition', async () => {
    await post({ name: 'caf\u00e9', value: '#fff' }).expect(201)
    const same = await post({ name: 'caf\u00e9', value: '#fff' }).expect(409)
    expect(same.body.type).toBe('/problems/token-name-taken')
    await post({ name: 'cafe\u0301', value: '#fff' }).expect(409)
  })

  it('refuses a name that would make a token of a group, or a group of a token', async () => {
    await post({ name: 'pier.north', value: '#fff' }).expect(201)
    for (const name of ['pier', 'pier.north.lamp']) {
      const { body } = await post({ name, value: '#fff' }).expect(422)
      expect(body.errors).toMatchObject([{ pointer: '/name' }])
    }
  })

  it.each(['a..b', '.a', '$a', 'a{b}', 'state-hover.a', 'a\u0007', 'x'.repeat(256)])(
    'refuses the name %j',
    async (name) => {
      const { body } = await post({ name, value: '#fff' }).expect(422)
      expect(body.errors).toMatchObject([{ pointer: '/name' }])
    },
  )

  it('refuses a lightness outside 0 to 1 in a colour object', async () => {
    const value = { colorSpace: 'oklch', components: [1.2, 0, 0] }
    const { body } = await post({ name: 'brighter', value }).expect(422)
    expect(body.errors[0].pointer).toMatch(/^\/value\/components/)
  })

  it('refuses an engineer and an accessibility lead, naming the role', async () => {
    for (const agent of [test.people.engineer, test.people.lead]) {
      const { body } = await agent
        .post(`${system.url}/tokens`)
        .send({ name: 'theirs', value: '#fff' })
        .expect(403)
      expect(body.type).toBe('/problems/role-missing')
      expect(body.detail).toContain('maintainer')
    }
  })

  it('refuses a direct write where the system takes edits by review only', async () => {
    const other = await createSampleSystem(test)
    await other.patchSettings({ writeMode: 'review' })
    const { body } = await other.maintainer
      .post(`${other.url}/tokens`)
      .send({ name: 'late', value: '#fff' })
      .expect(409)
    expect(body.type).toBe('/problems/review-required')
    await other.maintainer.get(`${other.url}/tokens/late`).expect(404)
  })
})
