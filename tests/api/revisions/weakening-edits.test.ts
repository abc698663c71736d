import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent, PersonName } from '#tests/support/people.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let pair: string
let admin: Agent
beforeAll(async () => {
  test = await createTestApp()
  admin = test.people.admin
})
afterAll(() => test.close())

const DARK = {
  name: 'Dark',
  ground: 'paper',
  ink: 'ink',
  level: 'AAA',
  values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
}

/** Everything that can be weakened, and breaches: grey on paper falls short wherever it is asked for 4.5. */
beforeEach(async () => {
  system = await createSampleSystem(test)
  await system.addToken('grey', '#8a8a8a', { states: ['hover'] })
  await system.addToken('fill', '{grey}')
  await system.addToken('deck', '#ffffff')
  await system.putTheme('dark', DARK)
  await system.addPair({ foreground: 'ink', background: 'deck', use: 'text', anyOf: 'ring' })
  pair = await system.addPair({
    foreground: 'grey',
    background: 'paper',
    use: 'text',
    backdrop: ['deck'],
    minimum: 7.5,
    level: 'AAA',
  })
  await system.patchSettings({ level: 'AA', disabledFloor: 2, p3: true, p3Gates: true })
})

const headOf = async () => (await system.maintainer.get(system.url).expect(200)).body.head
const patch = async (path: string, body: object, as: Agent = system.maintainer) => {
  const { headers } = await system.maintainer.get(`${system.url}${path}`).expect(200)
  return as.patch(`${system.url}${path}`).set('If-Match', String(headers.etag)).send(body)
}
const remove = async (path: string, as: Agent = system.maintainer) => {
  const { headers } = await system.maintainer.get(`${system.url}${path}`).expect(200)
  return as.delete(`${system.url}${path}`).set('If-Match', String(headers.etag))
}

interface Refused {
  readonly status: number
  readonly body: {
    readonly type: string
    readonly detail: string
    readonly errors: readonly { pointer?: string; code: string; detail: string }[]
  }
}
/** The refusal as lines, `code pointer`; nothing was written. */
async function refusedAs(answer: Refused, before: { revision: number }): Promise<string[]> {
  expect([answer.status, answer.body.type]).toEqual([403, '/problems/weakening-needs-approval'])
  expect(answer.body.detail).toContain('accessibility-lead')
  expect(await headOf()).toEqual(before)
  return answer.body.errors.map(({ code, pointer }) => `${code} ${pointer ?? ''}`.trim())
}

const WAYS: readonly (readonly [path: string, body: object, said: string[]])[] = [
  ['pair', { foreground: 'ink' }, ['pair-moved /foreground']],
  ['pair', { background: 'deck' }, ['pair-moved /background']],
  ['pair', { backdrop: null }, ['pair-moved /backdrop']],
  ['pair', { backdrop: 'unknown' }, ['pair-moved /backdrop']],
  ['pair', { use: 'focus-adjacent' }, ['use-asks-less /use']],
  ['pair', { minimum: null }, ['minimum-lowered /minimum']],
  ['pair', { level: null }, ['level-lowered /level']],
  ['pair', { relation: 'together' }, ['taken-together /relation']],
  ['pair', { states: ['rest'] }, ['pair-narrowed /states']],
  ['pair', { themes: ['light'] }, ['pair-narrowed /themes']],
  ['themes/dark', { level: null }, ['level-lowered /level']],
  ['themes/light', { gating: false }, ['gating-stopped /gating']],
  ['themes/light', { ground: 'deck' }, ['ground-moved /ground']],
  ['', { disabledFloor: null }, ['floor-lowered /disabledFloor']],
  ['', { disabledFloor: 1.5 }, ['floor-lowered /disabledFloor']],
  ['', { p3: false }, ['p3-switched-off /p3']],
  ['', { p3Gates: false }, ['p3-switched-off /p3Gates']],
  ['tokens/grey', { states: [] }, ['states-changed /states']],
]
const pathOf = (path: string) => (path === 'pair' ? `/pairs/${pair}` : path && `/${path}`)

describe('a maintainer under direct', () => {
  it.each(WAYS)('leaves what weakens to others: %s %j', async (path, body, said) => {
    const before = await headOf()
    expect(await refusedAs(await patch(pathOf(path), body), before)).toEqual(said)
    const allowed = await patch(pathOf(path), body, admin)
    expect([allowed.status, allowed.body.effect?.revision]).toEqual([200, before.revision + 1])
  })

  it('refuses the system a lower level', async () => {
    await system.patchSettings({ level: 'AAA' })
    const before = await headOf()
    const answer = await patch('', { level: 'AA' })
    expect(await refusedAs(answer, before)).toEqual(['level-lowered /level'])
  })

  it('refuses a pair and a theme that go', async () => {
    const before = await headOf()
    expect(await refusedAs(await remove(`/pairs/${pair}`), before)).toEqual(['pair-removed'])
    expect(await refusedAs(await remove('/themes/dark'), before)).toEqual(['theme-removed'])
    expect((await remove('/themes/dark', admin)).status).toBe(204)
    expect((await remove(`/pairs/${pair}`, admin)).status).toBe(204)
  })

  it('refuses a theme that is replaced by one that asks less', async () => {
    const before = await headOf()
    const { headers } = await system.maintainer.get(`${system.url}/themes/dark`).expect(200)
    const { level: _, ...less } = DARK
    const answer = await system.maintainer
      .put(`${system.url}/themes/dark`)
      .set('If-Match', String(headers.etag))
      .send({ ...less, gating: false })
    expect(await refusedAs(answer, before)).toEqual([
      'level-lowered /level',
      'gating-stopped /gating',
    ])
  })

  it('refuses a new pair that joins a group, and the group that a pair joins', async () => {
    const before = await headOf()
    const body = { foreground: 'deck', background: 'ink', use: 'text', anyOf: 'ring' }
    const joining = await system.maintainer.post(`${system.url}/pairs`).send(body)
    expect(await refusedAs(joining, before)).toEqual(['any-of-joined /anyOf'])
    const joined = await patch(`/pairs/${pair}`, { anyOf: 'ring' })
    expect(await refusedAs(joined, before)).toEqual(['any-of-joined /anyOf'])
  })

  it('refuses every weakening of an edit at once, and none of it is done', async () => {
    const before = await headOf()
    const edit = { minimum: null, level: null, states: ['rest'], product: 'kiosk' }
    expect(await refusedAs(await patch(`/pairs/${pair}`, edit), before)).toEqual([
      'minimum-lowered /minimum',
      'level-lowered /level',
      'pair-narrowed /states',
    ])
    const settings = await patch('', { p3: false, disabledFloor: null, name: 'Half' })
    expect(await refusedAs(settings, before)).toEqual([
      'p3-switched-off /p3',
      'floor-lowered /disabledFloor',
    ])
    expect((await system.maintainer.get(system.url)).body.name).not.toBe('Half')
  })

  it('answers what asks for more, and colours however they move', async () => {
    const edits: [string, object][] = [
      [`/pairs/${pair}`, { minimum: 9 }],
      ['/themes/light', { level: 'AAA' }],
      ['', { disabledFloor: 3 }],
      ['/tokens/grey', { value: '#111111' }],
      ['/tokens/grey', { states: ['hover', 'focus'] }],
      ['/tokens/fill', { value: '#222222' }],
    ]
    for (const [path, body] of edits) expect((await patch(path, body)).status).toBe(200)
  })
})

describe('keys', () => {
  it.each(['maintainer', 'admin'] as const)(
    'leaves the weakening of tokens to people, though the %s owns it',
    async (owner: PersonName) => {
      const { body } = await test.people[owner]
        .post(`${system.url}/keys`)
        .send({ name: 'Sync', scopes: ['tokens:write'] })
        .expect(201)
      const key = test.withKey(body.key)
      const before = await headOf()
      const answer = await patch('/tokens/grey', { states: [] }, key)
      expect(await refusedAs(answer, before)).toEqual(['states-changed /states'])
      expect((await patch('/tokens/grey', { value: '#222222' }, key)).status).toBe(200)
    },
  )
})

describe('under review', () => {
  it('refuses every direct write alike, whoever sends it', async () => {
    const { body: made } = await system.maintainer
      .post(`${system.url}/keys`)
      .send({ name: 'Sync', scopes: ['tokens:write'] })
      .expect(201)
    await system.patchSettings({ writeMode: 'review' })
    const before = await headOf()
    const { lead, maintainer } = test.people
    const exempt = { kind: 'logotype', reason: 'The line of the brand name' }
    const answers = [
      await patch('/tokens/grey', { value: '#111111' }),
      await patch('/tokens/grey', { value: '#111111' }, test.withKey(made.key)),
      await patch('/tokens/grey', { states: [] }),
      await patch(`/pairs/${pair}`, { exempt }, lead),
      await patch('/themes/light', { gating: false }, admin),
      await patch('', { level: 'AAA' }, lead),
      await remove(`/pairs/${pair}`, admin),
      await maintainer.post(`${system.url}/tokens`).send({ name: 'new', value: '#000' }),
    ]
    for (const { status, body } of answers) {
      expect([status, body.type]).toEqual([409, '/problems/review-required'])
    }
    expect(await headOf()).toEqual(before)
    const { headers } = await maintainer.get(`${system.url}/members`).expect(200)
    expect(headers.etag).toBeDefined()
    await maintainer.delete(`${system.url}/keys/${made.id}`).expect(204)
    expect((await patch('', { writeMode: 'direct' }, lead)).status).toBe(200)
    expect((await patch('/tokens/grey', { value: '#111111' })).status).toBe(200)
  })
})
