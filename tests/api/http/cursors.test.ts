import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent } from '#tests/support/people.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

/**
 * Lists are read page by page while others write. What stands from the first page to the last, and keeps what the
 * list is sorted by, comes exactly once. RFC 8288 for the links; the rest is this service's own.
 */
let test: TestApp
let system: SampleSystem
let admin: Agent
beforeAll(async () => {
  test = await createTestApp()
  admin = test.people.admin
})
afterAll(() => test.close())

interface Item {
  readonly id?: string
  readonly name?: string
  readonly number?: number
}

async function* pagesOf(first: string): AsyncGenerator<Item[]> {
  for (let url: string | undefined = first; url !== undefined; ) {
    const { body, headers }: { body: { items: Item[] }; headers: Record<string, string> } =
      await admin.get(url).expect(200)
    yield body.items
    url = /^<([^>]+)>; rel="next"$/.exec(headers.link ?? '')?.[1]
  }
}

const keyOf = ({ id, number }: Item): string => String(id ?? number)
async function wholeList(url: string): Promise<Item[]> {
  const all: Item[] = []
  for await (const items of pagesOf(url)) all.push(...items)
  return all
}

/** Reads a list in pages, with a write between any two; answers what came, in order. */
async function readAmid(url: string, write: (shown: readonly Item[]) => Promise<void>) {
  const came: Item[] = []
  for await (const items of pagesOf(url)) {
    came.push(...items)
    await write(items)
  }
  return came
}

/** The list before and after: what both have must have come once. */
async function expectWhole(
  url: string,
  write: (shown: readonly Item[]) => Promise<void>,
): Promise<void> {
  const before = (await wholeList(`${url}limit=200`)).map(keyOf)
  const came = (await readAmid(`${url}limit=3`, write)).map(keyOf)
  const after = new Set((await wholeList(`${url}limit=200`)).map(keyOf))
  expect(new Set(came).size).toBe(came.length)
  expect(came).toEqual(expect.arrayContaining(before.filter((key) => after.has(key))))
}

let made = 0
const newName = (): string => {
  made += 1
  return `${'qwertyuiopasdfghjkl'[made % 19]}${made}`
}
const grey = (level: number): string => `#${level.toString(16).padStart(2, '0').repeat(3)}`

async function addToken(): Promise<void> {
  await system.addToken(newName(), grey((made * 37) % 256))
}
async function removeToken({ name }: Item): Promise<void> {
  const url = `${system.url}/tokens/${name}`
  const { headers, status } = await admin.get(url)
  if (status !== 200) return
  await admin.delete(url).set('If-Match', String(headers.etag)).expect(204)
}
async function editToken({ name }: Item): Promise<void> {
  const url = `${system.url}/tokens/${name}`
  const { headers, status } = await admin.get(url)
  if (status !== 200) return
  const body = { description: newName() }
  await admin.patch(url).set('If-Match', String(headers.etag)).send(body).expect(200)
}

const RUNS = { numRuns: 4, endOnFailure: true }
const steps = fc.array(
  fc.record({
    what: fc.constantFrom('insert', 'delete', 'update'),
    /** Which item of the page: the last one is what the cursor names. */
    at: fc.constantFrom(0, -1),
  }),
  { minLength: 5, maxLength: 8 },
)

describe.each(['ledger', 'name', 'lowest'])('tokens by %s', (sort) => {
  it('come once each', { timeout: 60_000 }, async () => {
    await fc.assert(
      fc.asyncProperty(steps, async (plan) => {
        system = await createSampleSystem(test)
        for (let at = 0; at < 14; at += 1) await addToken()
        let turn = 0
        await expectWhole(`${system.url}/tokens?sort=${sort}&`, async (shown) => {
          const step = plan[turn]
          const item = shown.at(step?.at ?? 0)
          turn += 1
          if (step?.what === 'insert') await addToken()
          if (item === undefined || ['ink', 'paper'].includes(item.name ?? '')) return
          if (step?.what === 'delete') await removeToken(item)
          if (step?.what === 'update') await editToken(item)
        })
      }),
      RUNS,
    )
  })
})

describe('pairs, breaches, revisions and checks', () => {
  beforeAll(async () => {
    system = await createSampleSystem(test)
    for (let at = 0; at < 12; at += 1) {
      const name = newName()
      await system.addToken(name, grey(180 + at))
      await system.addPair({ foreground: name, background: 'paper', use: 'text' })
      await system.check()
    }
  })

  const moreOfAll = async (): Promise<void> => {
    const name = newName()
    await system.addToken(name, grey(170 + (made % 40)))
    await system.addPair({ foreground: name, background: 'paper', use: 'text' })
    await system.check()
  }

  it('are pairs that come once each', async () => {
    await expectWhole(`${system.url}/pairs?`, async (shown) => {
      const last = shown.at(-1)
      if (last?.id !== undefined) await system.removePair(last.id)
      if (made % 2 === 0) await moreOfAll()
    })
  })

  it.each(['first-seen', '-first-seen', 'shortfall', 'ratio', 'lowest-ratio', 'number'])(
    'are breaches that come once each by %s',
    async (sort) => {
      const url = `${system.url}/breaches?sort=${sort}&`
      let turn = 0
      await expectWhole(url, async () => {
        turn += 1
        if (turn <= 2) await moreOfAll()
      })
    },
  )

  it.each(['revisions', 'checks'])('are %s that come once each', async (list) => {
    let turn = 0
    await expectWhole(`${system.url}/${list}?`, async () => {
      turn += 1
      if (turn <= 3) await moreOfAll()
    })
  })

  it('are keys and members that come whole: their lists have no pages', async () => {
    for (let at = 0; at < 120; at += 1) {
      const body = { name: `key ${at}`, scopes: ['themes:read'] }
      await admin.post(`${system.url}/keys`).send(body).expect(201)
    }
    const { body, headers } = await admin.get(`${system.url}/keys`).expect(200)
    expect(body.items).toHaveLength(120)
    expect(headers.link).toBeUndefined()
  })
})

describe('a cursor', () => {
  it.each(['tokens', 'pairs', 'breaches', 'revisions', 'checks'])(
    'of %s is refused where it was forged, or is of another list',
    async (list) => {
      const forged = [
        'x',
        'e30',
        Buffer.from('{"id":1}').toString('base64url'),
        '%00',
        'a'.repeat(3_000),
      ]
      for (const cursor of forged) {
        const { body } = await admin.get(`${system.url}/${list}?cursor=${cursor}`).expect(400)
        expect(body.errors.map(({ parameter }: { parameter: string }) => parameter)).toEqual([
          'cursor',
        ])
      }
    },
  )
})
