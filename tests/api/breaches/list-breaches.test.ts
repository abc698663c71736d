import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

/** Three open breaches (2.32, 1.61 and 3.54 of 4.5) and one that was fixed. */
async function createBreachingSystem(): Promise<SampleSystem> {
  const system = await createSampleSystem(test)
  const colors = { soft: '#aaaaaa', faint: '#cccccc', dim: '#888888', grey: '#999999' }
  for (const [name, value] of Object.entries(colors)) {
    await system.addToken(name, value)
    await system.addPair({ foreground: name, background: 'paper', use: 'text' })
  }
  await system.editToken('grey', { value: '#000000' })
  return system
}

const numbersIn = (items: readonly BreachWire[]) => items.map(({ number }) => number)

describe('listBreaches', () => {
  let system: SampleSystem
  beforeAll(async () => {
    system = await createSampleSystem(test)
    await system.addToken('soft', '#aaaaaa')
    await system.addToken('faint', '#cccccc')
    await system.addToken('grey', '#999999')
    await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
    await system.addPair({ foreground: 'faint', background: 'paper', use: 'non-text' })
    await system.addPair({ foreground: 'grey', background: 'paper', use: 'text' })
    await system.editToken('grey', { value: '#000000' })
  })

  it('answers open breaches in the order of first sight, with the totals', async () => {
    const { body } = await test.people.engineer.get(`${system.url}/breaches`).expect(200)
    expect(body).toMatchObject({ total: 2, ever: 3 })
    expect(body.items).toMatchObject([
      {
        number: 1,
        origin: 'head',
        foreground: 'soft',
        background: 'paper',
        kind: 'text',
        theme: 'light',
        state: 'rest/rest',
        basis: 'srgb',
        status: 'open',
        gating: true,
        required: 4.5,
        rendered: { foreground: '#aaaaaa', background: '#ffffff' },
        lastSeenAt: null,
        assignee: null,
      },
      { number: 2, foreground: 'faint', kind: 'non-text', required: 3 },
    ])
    // ACT rule afw4f7, failed example 1: #aaa on #fff.
    expect(body.items[0].ratio).toBeCloseTo(2.3231, 4)
    expect(body.items[0].lowestRatio).toBe(body.items[0].ratio)
  })

  it('answers the ratio that a check answers, to the last digit', async () => {
    const { findings } = await system.check()
    const ratios = (await system.breaches()).map(({ ratio }) => ratio)
    expect(ratios).toEqual(findings.map(({ ratio }) => ratio))
  })

  it('answers what a status, a kind, a theme, a token or an origin asks for', async () => {
    const found = async (query: string) => numbersIn(await system.breaches(query))
    expect(await found('?status=resolved')).toEqual([3])
    expect(await found('?status=resolved&status=open')).toEqual([1, 2, 3])
    expect(await found('?kind=non-text')).toEqual([2])
    expect(await found('?theme=light')).toEqual([1, 2])
    expect(await found('?theme=dark')).toEqual([])
    expect(await found('?token=faint')).toEqual([2])
    expect(await found('?token=paper')).toEqual([1, 2])
    expect(await found('?token=nobody')).toEqual([])
    expect(await found('?origin=head')).toEqual([1, 2])
    expect(await found('?origin=ci')).toEqual([])
    const { body } = await test.people.engineer
      .get(`${system.url}/breaches?kind=non-text`)
      .expect(200)
    expect(body).toMatchObject({ total: 1, ever: 3 })
  })

  it('answers in the order that is asked for', async () => {
    const all = '?status=open&status=resolved'
    const sorted = async (sort: string) => numbersIn(await system.breaches(`${all}&sort=${sort}`))
    expect(await sorted('first-seen')).toEqual([1, 2, 3])
    expect(await sorted('-first-seen')).toEqual([3, 2, 1])
    expect(await sorted('number')).toEqual([1, 2, 3])
    // 2.32 of 4.5 is 0.516, 1.61 of 3 is 0.535, 21 of 4.5 is 4.67.
    expect(await sorted('shortfall')).toEqual([1, 2, 3])
    await system.editToken('faint', { value: '#eeeeee' })
    expect(await sorted('shortfall')).toEqual([2, 1, 3])
  })

  it.each(['first-seen', '-first-seen', 'shortfall', 'number'])(
    'answers every breach once, page by page by %s, while others come and go',
    async (sort) => {
      const paged = await createBreachingSystem()
      const seen: number[] = []
      let next = `${paged.url}/breaches?sort=${sort}&limit=1`
      let page = 0
      while (next !== '') {
        const { body, headers } = await test.people.engineer.get(next).expect(200)
        seen.push(...numbersIn(body.items))
        next = /<([^>]+)>; rel="next"/.exec(String(headers.link))?.[1] ?? ''
        page += 1
        if (page === 1) {
          await paged.addToken('late', '#000000')
          await paged.addPair({ foreground: 'late', background: 'paper', use: 'text' })
          await paged.editToken('late', { value: '#777777' })
          await paged.editToken('late', { value: '#000000' })
        }
      }
      expect(seen.toSorted()).toEqual([1, 2, 3])
    },
  )

  it('calls tokens what they are called now, and deleted ones by their last name', async () => {
    const renamed = await createSampleSystem(test)
    await renamed.addToken('soft', '#aaaaaa')
    const pair = await renamed.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
    await renamed.editToken('soft', { name: 'softer' })
    expect(await renamed.breaches('?token=softer')).toMatchObject([{ foreground: 'softer' }])
    expect(await renamed.breaches('?token=soft')).toEqual([])
    await renamed.removePair(pair)
    await renamed.editToken('softer', { name: 'softest' })
    await renamed.removeToken('softest')
    expect(await renamed.breaches('?status=resolved&token=softest')).toMatchObject([
      { foreground: 'softest', closingReason: 'pair-removed' },
    ])
    await renamed.addToken('soft', '#000000')
    expect(await renamed.breaches('?status=resolved&token=soft')).toEqual([])
  })

  it('answers 304 until the log changes', async () => {
    const url = `${system.url}/breaches`
    const { headers } = await test.people.engineer.get(url).expect(200)
    const again = () => test.people.engineer.get(url).set('If-None-Match', String(headers.etag))
    await again().expect(304)
    await system.editToken('soft', { value: '#bbbbbb' })
    await again().expect(200)
  })

  it('refuses a parameter that cannot be used, and a stranger as absent', async () => {
    for (const query of [
      '?status=closed',
      '?sort=height',
      '?cursor=e30',
      '?limit=0',
      '?order=up',
    ]) {
      await test.people.engineer.get(`${system.url}/breaches${query}`).expect(400)
    }
    await test.people.stranger.get(`${system.url}/breaches`).expect(404)
    await test.anonymous.get(`${system.url}/breaches`).expect(401)
  })
})
