import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
const ids: string[] = []
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  for (const pair of [
    { foreground: 'ink', background: 'paper', use: 'text' },
    { foreground: 'paper', background: 'ink', use: 'non-text', product: 'kiosk' },
    { foreground: 'ink', background: 'ink', use: 'focus-change' },
  ]) {
    ids.push(await system.addPair(pair))
  }
})
afterAll(() => test.close())

const found = async (query: string) => {
  const { body } = await test.people.engineer.get(`${system.url}/pairs${query}`).expect(200)
  return body.items.map(({ id }: { id: string }) => ids.indexOf(id))
}

describe('listPairs', () => {
  it.each([
    ['', [0, 1, 2]],
    ['?token=paper', [0, 1]],
    ['?token=none', []],
    ['?use=text', [0]],
    ['?product=kiosk', [1]],
    ['?token=ink&use=focus-change', [2]],
  ])('answers %s in the order of declaration', async (query, expected) => {
    expect(await found(query)).toEqual(expected)
  })

  it('answers page by page, also when the last pair of a page is removed meanwhile', async () => {
    const first = await test.people.engineer.get(`${system.url}/pairs?limit=2`).expect(200)
    const next = /<([^>]+)>; rel="next"/.exec(first.headers.link ?? '')?.[1]
    await system.removePair(String(ids[1]))
    const { body, headers } = await test.people.engineer.get(String(next)).expect(200)
    expect(body.items.map(({ id }: { id: string }) => id)).toEqual([ids[2]])
    expect(headers.link).toBeUndefined()
  })
})
