import { createHash } from 'node:crypto'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createRepositories } from '#api/repositories.ts'
import { systems } from '#drizzle/schema/systems.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const get = async (number: number) =>
  (await test.people.engineer.get(`${system.url}/revisions/${number}`).expect(200)).body
const head = async (): Promise<number> =>
  (await system.maintainer.get(system.url).expect(200)).body.head.revision

/** What a system answers of its items now, without what a revision does not hold. */
async function standing() {
  const itemsOf = async (path: string) =>
    (await system.maintainer.get(`${system.url}/${path}`).expect(200)).body.items as object[]
  const without =
    (...names: string[]) =>
    (item: object) =>
      Object.fromEntries(Object.entries(item).filter(([name]) => !names.includes(name)))
  return {
    tokens: (await itemsOf('tokens')).map(without('etag', 'resolved', 'standing')),
    pairs: (await itemsOf('pairs')).map(without('etag')),
    themes: (await itemsOf('themes')).map(without('etag', 'values')),
  }
}

describe('getRevision', () => {
  it('answers the system as it stood, whole, at any number', async () => {
    await system.addToken('soft', '#aaaaaa', { states: ['hover'], description: 'Hints' })
    await system.addToken('hint', '{soft}')
    await system.addToken('deep', {
      derive: '{ink}',
      lightness: 0.1,
    })
    const pair = await system.addPair({ foreground: 'hint', background: 'paper', use: 'text' })
    const [number, then] = [await head(), await standing()]
    await system.editToken('soft', { name: 'softer', value: '#999999', locked: false })
    await system.removePair(pair)
    await system.removeToken('hint')
    await system.patchSettings({ level: 'AAA' })
    await system.patchTheme('light', { name: 'Day' })
    const revision = await get(number)
    expect(revision).toMatchObject(then)
    expect(revision.settings).toEqual({
      level: 'AA',
      p3: false,
      p3Gates: false,
      disabledFloor: null,
    })
    const now = await get(await head())
    expect(now).toMatchObject(await standing())
    expect(now.settings.level).toBe('AAA')
  })

  it('answers revision 0: the settings, and nothing else', async () => {
    expect(await get(0)).toMatchObject({
      number: 0,
      origin: 'created',
      tokens: [],
      pairs: [],
      themes: [],
      prefixes: [],
      settings: { level: 'AA', p3: true },
    })
  })

  it('answers what it did, item by item', async () => {
    const done = async () =>
      (await get(await head())).edits.map(
        ({ item, operation, name }: Record<string, string>) => `${item} ${operation} ${name}`,
      )
    await system.addToken('mist', '#aaaaaa')
    expect(await done()).toEqual(['token added mist'])
    await system.editToken('mist', { name: 'fog' })
    expect(await done()).toEqual(['token edited fog'])
    const pair = await system.addPair({ foreground: 'fog', background: 'paper', use: 'non-text' })
    expect(await done()).toEqual(['pair added fog on paper'])
    await system.editPair(pair, { minimum: 4 })
    expect(await done()).toEqual(['pair edited fog on paper'])
    await system.removePair(pair)
    expect(await done()).toEqual(['pair removed fog on paper'])
    await system.removeToken('fog')
    expect(await done()).toEqual(['token removed fog'])
    await system.patchSettings({ level: 'AA' })
    expect(await done()).toEqual(['settings edited settings'])
    const { headers } = await system.maintainer.get(`${system.url}/rules`).expect(200)
    const put = system.maintainer.put(`${system.url}/rules`).set('If-Match', String(headers.etag))
    const states = { hover: { lightness: 0.1 } }
    await put.send({ states, prefixes: [{ prefix: 'action', states }] }).expect(200)
    expect((await done()).toSorted()).toEqual(['rules added action', 'rules added states'])
    await system.putTheme('dusk', {
      name: 'Dusk',
      ground: 'paper',
      ink: 'ink',
      values: { paper: { rest: '#eeeeee' }, ink: { rest: '#000000' } },
    })
    expect((await done()).toSorted()).toEqual([
      'theme added dusk',
      'token edited ink',
      'token edited paper',
    ])
  })

  it('carries the digest that its stored state comes to, by an independent reckoning', async () => {
    const { db } = test.service.platform.database
    const key = system.url.split('/').at(-1) ?? ''
    const [row] = await db.select({ id: systems.id }).from(systems).where(eq(systems.key, key))
    const { versions } = createRepositories(db)
    for (const number of [0, 4, await head()]) {
      const model = await versions.systemAt(row?.id ?? '', number)
      const { settings, states, prefixes, themes, tokens, pairs } = model
      const lines = [
        ...[settings].map((item) => ['settings', item] as const),
        ...[states].map((item) => ['states', item] as const),
        ...prefixes.map((item) => ['prefix', item] as const),
        ...themes.map((item) => ['theme', item] as const),
        ...tokens.map((item) => ['token', item] as const),
        ...pairs.map((item) => ['pair', item] as const),
      ].map(([kind, item]) => `${kind} ${sha256(canonical(item))}\n`)
      expect((await get(number)).digest).toBe(sha256(lines.join('')))
    }
  })

  it('answers 304 to whoever has it: a revision never changes', async () => {
    const url = `${system.url}/revisions/2`
    const { headers } = await test.people.engineer.get(url).expect(200)
    await system.editToken('ink', { value: '#010101' })
    await test.people.engineer.get(url).set('If-None-Match', String(headers.etag)).expect(304)
  })

  it('refuses a number that is not there, or none', async () => {
    const next = (await head()) + 1
    await test.people.engineer.get(`${system.url}/revisions/${next}`).expect(404)
    for (const number of ['-1', '1.5', 'head', '4294967295']) {
      await test.people.engineer.get(`${system.url}/revisions/${number}`).expect(400)
    }
    await test.people.stranger.get(`${system.url}/revisions/1`).expect(404)
  })
})

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex')

/** JSON with sorted members (RFC 8785), reckoned apart from the service's own. */
function canonical(value: unknown): string {
  return JSON.stringify(value, (_, member) =>
    member !== null && typeof member === 'object' && !Array.isArray(member)
      ? Object.fromEntries(Object.entries(member).toSorted(([a], [b]) => (a < b ? -1 : 1)))
      : member,
  )
}
