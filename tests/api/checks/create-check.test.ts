import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('link', '#0000ee', { states: ['hover'] })
  await system.addToken('soft', '#aaaaaa')
  for (const foreground of ['link', 'soft']) {
    await system.addPair({ foreground, background: 'paper', use: 'text' })
  }
})
afterAll(() => test.close())

const post = (body: object, query = '') =>
  system.maintainer.post(`${system.url}/checks${query}`).send(body)
const shown = ({ findings }: CheckWire) =>
  findings.map(({ foreground, state, outcome }) => `${foreground} ${state} ${outcome}`)

describe('createCheck', () => {
  it('answers 200 with the verdict of the head: a failing check is no error', async () => {
    const check = await system.check()
    expect(check).toMatchObject({
      verdict: 'fail',
      counts: { breach: 1, waived: 0, exempt: 0, known: 0 },
      engine: { gamutMap: 'css-color-4-binary-search-local-minde' },
      advisories: [],
    })
    expect(shown(check)).toEqual(['soft rest/rest breach'])
    const head = await system.maintainer.get(system.url).expect(200)
    expect(check.against.revision).toBe(head.body.head.revision)
    expect(check.counts.pass).toBe((await system.check({}, '?findings=all')).findings.length - 1)
  })

  it('answers every finding with findings=all', async () => {
    expect(shown(await system.check({}, '?findings=all'))).toEqual([
      'link rest/rest pass',
      'link hover/rest pass',
      'soft rest/rest breach',
    ])
  })

  it('measures a candidate merged over the head, and leaves the head as it is', async () => {
    const before = await system.maintainer.get(system.url).expect(200)
    const check = await system.check({ tokens: { soft: dtcgHex('000000') } })
    expect(check).toMatchObject({ verdict: 'pass', findings: [] })
    const after = await system.maintainer.get(system.url).expect(200)
    expect(after.body).toEqual(before.body)
    expect(await system.breaches()).toHaveLength(1)
  })

  it('answers breaches of the head as known with newOnly, and a lower one as breach', async () => {
    expect(await system.check({ newOnly: true })).toMatchObject({
      verdict: 'pass',
      counts: { breach: 0, known: 1 },
      findings: [{ outcome: 'known' }],
    })
    const lower = { tokens: { soft: dtcgHex('bbbbbb') }, newOnly: true }
    expect(await system.check(lower)).toMatchObject({ verdict: 'fail', counts: { breach: 1 } })
  })

  it('measures sent pairs beside the declared ones, by name and theme key', async () => {
    const pairs = [{ foreground: 'brand', background: 'paper', use: 'non-text', product: 'kiosk' }]
    const check = await system.check({ tokens: { brand: dtcgHex('dddddd') }, pairs })
    expect(check.findings[1]).toMatchObject({
      foreground: 'brand',
      background: 'paper',
      theme: 'light',
      state: 'rest/rest',
      use: 'non-text',
      required: 3,
      basis: 'srgb',
      rendered: { foreground: '#dddddd', background: '#ffffff' },
    })
  })

  it('answers the ratio that WCAG defines beside the one on P3 luminance that decides', async () => {
    const wide = await createSampleSystem(test)
    await wide.patchSettings({ p3: true, p3Gates: true })
    await wide.addToken('beacon', 'color(display-p3 1 0 0)')
    await wide.addPair({ foreground: 'beacon', background: 'paper', use: 'text' })
    await wide.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    const { findings } = await wide.check({}, '?findings=all')
    const [red, black] = findings
    expect(red).toMatchObject({ foreground: 'beacon', basis: 'p3' })
    expect(red?.srgbRatio).toBeGreaterThan(red?.ratio ?? 21)
    expect(black).toMatchObject({ foreground: 'ink', basis: 'srgb' })
    expect(black).not.toHaveProperty('srgbRatio')
  })

  it('keeps the fingerprint of a finding across a rename and another threshold', async () => {
    const renamed = await createSampleSystem(test)
    await renamed.addToken('soft', '#aaaaaa')
    await renamed.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
    const before = await renamed.check()
    await renamed.editToken('soft', { name: 'softer' })
    const after = await renamed.check()
    expect(after.findings[0]).toEqual({ ...before.findings[0], foreground: 'softer' })
    await renamed.patchSettings({ level: 'AAA' })
    const [stricter] = (await renamed.check()).findings
    expect(stricter).toEqual({ ...after.findings[0], required: 7 })
  })

  it('answers advisories by name', async () => {
    const tokens = { pale: { ...dtcgHex('ffffff'), $extensions: {} } }
    const states = {
      states: ['focus', 'hover'],
      rules: { states: { hover: { lightness: 0.001 } } },
    }
    const own = { ...tokens.pale, $extensions: { 'dev.dyewright': states } }
    const { advisories } = await system.check({ tokens: { pale: own } })
    expect(advisories).toContainEqual({
      code: 'state-invisible',
      token: 'pale',
      theme: 'light',
      state: 'hover',
    })
  })

  it('numbers the checks of a system and keeps where they came from', async () => {
    const source = {
      repository: 'larkhaven/timetable',
      branch: 'main',
      commit: '4be1d02',
      pipelineUrl: 'https://ci.larkhaven.example/runs/7',
    }
    const first = await system.check({ source })
    const second = await system.check({ source: { branch: 'main' } })
    expect(second.number).toBe(first.number + 1)
    expect(first.source).toEqual(source)
    expect(second.source).toEqual({ branch: 'main' })
    const fresh = await createSampleSystem(test)
    expect((await fresh.check()).number).toBe(1)
  })

  it('gives parallel checks different numbers', async () => {
    const fresh = await createSampleSystem(test)
    const checks = await Promise.all(Array.from({ length: 8 }, () => fresh.check()))
    expect(checks.map(({ number }) => number).toSorted((a, b) => a - b)).toEqual([
      1, 2, 3, 4, 5, 6, 7, 8,
    ])
  })

  it('answers pass for a system that has nothing yet', async () => {
    await test.createSystem('bare')
    const { body } = await test.people.engineer.post('/v1/systems/bare/checks').send({}).expect(200)
    expect(body).toMatchObject({ verdict: 'pass', counts: { pass: 0, breach: 0 }, findings: [] })
  })
})

describe('createCheck refuses', () => {
  const pointersOf = async (body: object, code = 'request-invalid') => {
    const answer = await post(body).expect(422)
    expect(answer.body.type).toBe(`/problems/${code}`)
    return (answer.body.errors as { pointer?: string }[]).map(({ pointer }) => pointer)
  }

  it('every fault of a document with its pointer', async () => {
    const tokens = {
      red: { $type: 'color', $value: '#f00' },
      far: { $type: 'color', $value: { colorSpace: 'srgb', components: [2, 0, 0] } },
      nowhere: { $type: 'color', $value: '{no.such}' },
    }
    expect((await pointersOf({ tokens })).toSorted()).toEqual([
      '/tokens/far/$value/components/0',
      '/tokens/nowhere/$value',
      '/tokens/red/$value',
    ])
  })

  it('unknown names in pairs with a pointer for each', async () => {
    const pairs = [{ foreground: 'lnk', background: 'papr', use: 'text', themes: ['dusk'] }]
    expect(await pointersOf({ pairs })).toEqual([
      '/pairs/0/foreground',
      '/pairs/0/background',
      '/pairs/0/themes/0',
    ])
  })

  it('a replacement that lacks a token of a declared pair', async () => {
    const tokens = { paper: dtcgHex('ffffff'), ink: dtcgHex('000000'), link: dtcgHex('000000') }
    expect(await pointersOf({ tokens, mode: 'replace' })).toEqual(['/tokens'])
  })

  it('what cannot be resolved, as system-unresolvable, in the names of the system', async () => {
    const answer = await post({ tokens: { paper: dtcgHex('101010') } }).expect(422)
    expect(answer.body).toMatchObject({
      type: '/problems/system-unresolvable',
      errors: [{ pointer: '/tokens', code: 'theme-span' }],
    })
    const lower = [{ foreground: 'ink', background: 'paper', use: 'text', minimum: 2 }]
    expect(await pointersOf({ pairs: lower }, 'system-unresolvable')).toEqual(['/pairs/0/minimum'])
    const text = JSON.stringify(answer.body)
    expect(text).not.toMatch(/tok_|thm_/)
  })

  it('an exemption of a pair from whoever is no accessibility lead, and from any key', async () => {
    const exempt = { kind: 'logotype', reason: 'The line of the brand name' }
    const soft = { foreground: 'ink', background: 'paper', use: 'text' }
    const sent = { pairs: [soft, { ...soft, exempt }, { ...soft, foreground: 'no', exempt }] }
    expect(await pointersOf(sent)).toEqual([
      '/pairs/1/exempt',
      '/pairs/2/exempt',
      '/pairs/2/foreground',
    ])
    const made = await test.people.admin
      .post(`${system.url}/keys`)
      .send({ name: 'pipeline', scopes: ['checks:write'] })
      .expect(201)
    const one = { pairs: [{ ...soft, exempt }] }
    const refused = await test.withKey(made.body.key).post(`${system.url}/checks`).send(one)
    expect(refused.status).toBe(422)
    expect(refused.body.errors).toMatchObject([{ pointer: '/pairs/0/exempt' }])
    for (const agent of [test.people.lead, test.people.admin]) {
      const { body } = await agent.post(`${system.url}/checks`).send(one).expect(200)
      expect(body.counts.exempt).toBeGreaterThan(0)
    }
  })

  it('another revision than head, and members that nobody knows', async () => {
    expect(await pointersOf({ against: '1.0.0' })).toEqual(['/against'])
    expect(await pointersOf({ tokns: {} })).toEqual(['/tokns'])
    expect(await pointersOf({ source: { pipelineUrl: 'ftp://ci' } })).toEqual([
      '/source/pipelineUrl',
    ])
    const pairs = [{ foreground: 'ink', background: 'paper', use: 'prose' }]
    expect(await pointersOf({ pairs })).toEqual(['/pairs/0/use'])
  })

  it('a query parameter that it does not know', async () => {
    await post({}, '?findings=none').expect(400)
    await post({}, '?finding=all').expect(400)
  })

  it('a stranger as absent, nobody as unknown, and a key without the scope', async () => {
    await test.people.stranger.post(`${system.url}/checks`).send({}).expect(404)
    await test.anonymous.post(`${system.url}/checks`).send({}).expect(401)
    const made = await system.maintainer
      .post(`${system.url}/keys`)
      .send({ name: 'reader', scopes: ['themes:read'] })
      .expect(201)
    const answer = await test.withKey(made.body.key).post(`${system.url}/checks`).send({})
    expect(answer.status).toBe(403)
    expect(answer.body).toMatchObject({ type: '/problems/scope-missing', scopes: ['checks:write'] })
  })
})
