import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
  await system.editToken('soft', { value: '#666666', message: 'Dark enough' })
})
afterAll(() => test.close())

const numbersIn = (items: { number: number }[]) => items.map(({ number }) => number)

describe('listRevisions', () => {
  it('answers every revision, newest first, back to the empty system', async () => {
    const { body } = await test.people.engineer.get(`${system.url}/revisions`).expect(200)
    expect(numbersIn(body.items)).toEqual([7, 6, 5, 4, 3, 2, 1, 0])
    expect(body.items.at(-1)).toMatchObject({ origin: 'created', verdict: 'pass' })
    expect(body.items[0]).toMatchObject({
      origin: 'direct',
      author: { name: 'Ines Marrow' },
      message: 'Dark enough',
      verdict: 'pass',
      counts: { pass: 1, breach: 0 },
      engine: { gamutMap: 'css-color-4-binary-search-local-minde' },
    })
    expect(body.items[1]).toMatchObject({ verdict: 'fail', counts: { pass: 0, breach: 1 } })
    const digests = body.items.map(({ digest }: { digest: string }) => digest)
    expect(new Set(digests).size).toBe(8)
  })

  it('leads on page by page, also while revisions are added', async () => {
    const first = await test.people.engineer.get(`${system.url}/revisions?limit=3`).expect(200)
    const newest = first.body.items[0].number
    await system.editToken('soft', { description: 'For hints' })
    const next = /<([^>]+)>; rel="next"/.exec(String(first.headers.link))?.[1] ?? ''
    const second = await test.people.engineer.get(next).expect(200)
    expect(numbersIn(second.body.items)).toEqual([newest - 3, newest - 4, newest - 5])
    const third = /<([^>]+)>; rel="next"/.exec(String(second.headers.link))?.[1] ?? ''
    const last = await test.people.engineer.get(third).expect(200)
    expect(numbersIn(last.body.items)).toEqual([1, 0])
    expect(last.headers.link).toBeUndefined()
  })

  it('refuses a parameter that cannot be used, and a stranger as absent', async () => {
    for (const query of ['?cursor=nonsense', '?limit=0', '?author=me']) {
      await test.people.engineer.get(`${system.url}/revisions${query}`).expect(400)
    }
    await test.people.stranger.get(`${system.url}/revisions`).expect(404)
    await test.anonymous.get(`${system.url}/revisions`).expect(401)
  })
})
