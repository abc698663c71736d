import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('text.muted', '#8a8a8a', { states: ['disabled'] })
  await system.addToken('text.body', '#222222')
  await system.addToken('button.fill', '#005a9c', { states: ['hover', 'disabled'] })
  await system.addToken('button.label', '{paper}')
  await system.addPair({ foreground: 'text.muted', background: 'paper', use: 'text' })
  await system.addPair({ foreground: 'text.body', background: 'paper', use: 'text' })
  await system.addPair({
    foreground: 'button.label',
    background: 'button.fill',
    use: 'text',
    relation: 'together',
  })
  await system.putTheme('dark', {
    name: 'Dark',
    ground: 'paper',
    ink: 'ink',
    rule: { kind: 'match-contrast' },
    values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
  })
})
afterAll(() => test.close())

const LEDGER = ['paper', 'ink', 'text.muted', 'text.body', 'button.fill', 'button.label']

async function names(query: string): Promise<string[]> {
  const { body } = await test.people.engineer.get(`${system.url}/tokens${query}`).expect(200)
  return body.items.map(({ name }: { name: string }) => name)
}

interface Item {
  name: string
  etag: string
  standing: { mark: string | null; breaches: number; pairs: number; lowest: { ratio: number } }
}

describe('listTokens', () => {
  it('answers ledger order with each token as its own address answers it', async () => {
    expect(await names('')).toEqual(LEDGER)
    const { body } = await test.people.engineer.get(`${system.url}/tokens`)
    for (const { standing, ...token } of body.items) {
      const { body: one } = await test.people.engineer.get(`${system.url}/tokens/${token.name}`)
      expect(token).toEqual(one)
      expect(standing).toBeDefined()
    }
  })

  it('answers how each token stands among its pairs', async () => {
    const { body } = await test.people.engineer.get(`${system.url}/tokens`)
    const byName = new Map((body.items as Item[]).map((item) => [item.name, item.standing]))
    // #8a8a8a on white is 3.452 (WCAG 2.2 relative luminance).
    expect(byName.get('text.muted')).toMatchObject({ mark: 'breach', pairs: 1 })
    expect(byName.get('text.muted')?.lowest.ratio).toBeCloseTo(3.452, 3)
    expect(byName.get('text.muted')?.lowest).toMatchObject({
      required: 4.5,
      theme: 'light',
      state: 'rest/rest',
      outcome: 'breach',
      foreground: 'text.muted',
      background: 'paper',
    })
    expect(byName.get('paper')).toMatchObject({ mark: 'breach-on-it', pairs: 2 })
    expect(byName.get('text.body')?.mark).toBeNull()
    expect(byName.get('button.label')).toMatchObject({ mark: 'exempt', pairs: 1 })
    expect(byName.get('ink')).toMatchObject({ mark: null, pairs: 0, lowest: null })
  })

  it('answers the strip: name, a hex on either side and the mark of every token', async () => {
    const { body } = await test.people.engineer.get(`${system.url}/tokens?view=ledger`).expect(200)
    expect(body.items).toHaveLength(LEDGER.length)
    expect(body.items[0]).toEqual({
      name: 'paper',
      hexes: { light: '#ffffff', dark: '#0b1220' },
      mark: 'breach-on-it',
      themes: expect.arrayContaining(['light']),
    })
  })

  it('answers a strip of more tokens than a page at once, and a page of it when asked', async () => {
    await test.createSystem('long-strip')
    const url = '/v1/systems/long-strip/tokens'
    for (let at = 0; at < 101; at += 1) {
      await test.people.maintainer
        .post(url)
        .send({ name: `t.${at}`, value: '#fff' })
        .expect(201)
    }
    const whole = await test.people.engineer.get(`${url}?view=ledger`).expect(200)
    expect([whole.body.items.length, whole.headers.link]).toEqual([101, undefined])
    const page = await test.people.engineer.get(`${url}?view=ledger&limit=7`).expect(200)
    expect([page.body.items.length, page.headers.link]).toEqual([7, expect.any(String)])
    expect((await test.people.engineer.get(url).expect(200)).body.items).toHaveLength(100)
  })

  it.each([
    ['?named=TEXT', ['text.muted', 'text.body']],
    ['?group=button', ['button.fill', 'button.label']],
    ['?mark=breach', ['text.muted']],
    ['?mark=none&named=n', ['ink', 'button.fill']],
    ['?sort=name', [...LEDGER].sort()],
  ])('answers %s', async (query, expected) => {
    expect(await names(query)).toEqual(expected)
  })

  it('answers the furthest short first when sorted by lowest', async () => {
    const sorted = await names('?sort=lowest')
    expect(sorted.slice(0, 2).sort()).toEqual(['paper', 'text.muted'])
    expect(sorted.at(-1)).toBe('ink')
  })

  it.each(['ledger', 'name', 'lowest'])('answers page by page in the order %s', async (sort) => {
    const seen: string[] = []
    let url: string | undefined = `${system.url}/tokens?limit=2&sort=${sort}`
    while (url) {
      const answer: { body: { items: Item[] }; headers: Record<string, string> } =
        await test.people.engineer.get(url).expect(200)
      seen.push(...answer.body.items.map(({ name }) => name))
      url = /<([^>]+)>; rel="next"/.exec(answer.headers.link ?? '')?.[1]
    }
    expect(seen).toEqual(await names(`?sort=${sort}`))
  })

  it('leaves no token out when the last one of a page is deleted meanwhile', async () => {
    await system.addToken('zz.1', '#111111')
    await system.addToken('zz.2', '#222222')
    const first = await test.people.engineer.get(`${system.url}/tokens?group=zz&limit=1`)
    await system.removeToken('zz.1')
    const next = /<([^>]+)>/.exec(first.headers.link ?? '')?.[1]
    const { body } = await test.people.engineer.get(String(next)).expect(200)
    expect(body.items.map(({ name }: Item) => name)).toEqual(['zz.2'])
    await system.removeToken('zz.2')
  })

  it('refuses a query that it does not know, and a cursor that is none', async () => {
    const unknown = await test.people.engineer.get(`${system.url}/tokens?colour=red`).expect(400)
    expect(unknown.body.errors).toMatchObject([{ parameter: 'colour' }])
    const { body } = await test.people.engineer.get(`${system.url}/tokens?cursor=zzz`).expect(400)
    expect(body.errors).toMatchObject([{ parameter: 'cursor' }])
    await test.people.engineer.get(`${system.url}/tokens?limit=501`).expect(400)
  })

  it('answers an empty system', async () => {
    const { body } = await test.people.engineer.get('/v1/systems/larkhaven/tokens').expect(200)
    expect(body.items).toEqual([])
    await test.people.engineer.get('/v1/systems/larkhaven/tokens?view=ledger').expect(200)
  })
})
