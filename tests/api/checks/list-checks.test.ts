import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CheckSummaryWire } from '#shared/contracts/checks.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
  const failing = { ink: dtcgHex('222222'), paper: dtcgHex('ffffff') }
  await system.check({ source: { repository: 'larkhaven/kiosk', branch: 'main' } })
  await system.check({ source: { repository: 'larkhaven/kiosk', branch: 'glare' } })
  await system.check({
    tokens: { soft: dtcgHex('cccccc'), ...failing },
    pairs: [{ foreground: 'soft', background: 'paper', use: 'text' }],
    source: { repository: 'larkhaven/crew', branch: 'main' },
  })
})
afterAll(() => test.close())

const list = async (query = '') => {
  const { body, headers } = await test.people.engineer
    .get(`${system.url}/checks${query}`)
    .expect(200)
  const items: CheckSummaryWire[] = body.items
  return { numbers: items.map(({ number }) => number), items, link: headers.link }
}

describe('listChecks', () => {
  it('answers the checks, newest first, without their findings', async () => {
    const { numbers, items } = await list()
    expect(numbers).toEqual([3, 2, 1])
    expect(items[0]).toMatchObject({ verdict: 'fail', counts: { breach: 1 } })
    expect(items[0]).not.toHaveProperty('findings')
  })

  it('answers those of a verdict, a repository or a branch', async () => {
    expect((await list('?verdict=fail')).numbers).toEqual([3])
    expect((await list('?repository=larkhaven/kiosk')).numbers).toEqual([2, 1])
    expect((await list('?repository=larkhaven/kiosk&branch=main')).numbers).toEqual([1])
    expect((await list('?branch=main')).numbers).toEqual([3, 1])
  })

  it('answers who asked, and what one person or key asked for', async () => {
    const made = await system.maintainer
      .post(`${system.url}/keys`)
      .send({ name: 'Timetable pipeline', scopes: ['checks:write'] })
      .expect(201)
    const pipeline = test.withKey(made.body.key)
    const { body } = await pipeline.post(`${system.url}/checks`).send({}).expect(200)
    expect(body.caller).toEqual({ kind: 'key', id: made.body.id, name: 'Timetable pipeline' })
    const byKey = await list(`?caller=${made.body.id}`)
    expect(byKey.items).toMatchObject([{ id: body.id, caller: body.caller }])
    const { caller } = (await list('?branch=glare')).items[0] as CheckSummaryWire
    expect(caller).toMatchObject({ kind: 'user', name: 'Ines Marrow' })
    expect((await list(`?caller=${caller.id}`)).numbers).toEqual([3, 2, 1])
    expect((await list('?caller=usr_nobody')).numbers).toEqual([])
    const own = await pipeline.get(`${system.url}/checks?caller=${caller.id}`).expect(200)
    expect(own.body.items).toEqual([])
  })

  it('answers what each check left in the log', async () => {
    const { items } = await list('?repository=larkhaven/crew')
    expect(items).toMatchObject([{ logged: { protected: false, seen: 1, opened: 0, resolved: 0 } }])
    const { body } = await test.people.engineer
      .get(`${system.url}/checks/${items[0]?.id}`)
      .expect(200)
    expect(body.logged).toEqual(items[0]?.logged)
  })

  it('leads on to the next page, also while checks are added', async () => {
    const all = (await list()).numbers
    const first = await list(`?limit=${all.length - 1}`)
    expect(first.numbers).toEqual(all.slice(0, -1))
    const next = /<([^>]+)>; rel="next"/.exec(String(first.link))?.[1] ?? ''
    await system.check()
    const { body, headers } = await test.people.engineer.get(next).expect(200)
    expect(body.items.map(({ number }: CheckSummaryWire) => number)).toEqual([1])
    expect(headers.link).toBeUndefined()
  })

  it('answers a key with its own checks only', async () => {
    const keyOf = async (name: string) => {
      const keys = system.maintainer.post(`${system.url}/keys`)
      return (await keys.send({ name, scopes: ['checks:write'] }).expect(201)).body.key
    }
    const [one, other] = [test.withKey(await keyOf('one')), test.withKey(await keyOf('other'))]
    const { body: mine } = await one.post(`${system.url}/checks`).send({}).expect(200)
    await other.post(`${system.url}/checks`).send({}).expect(200)
    const { body } = await one.get(`${system.url}/checks`).expect(200)
    expect(body.items.map(({ id }: CheckSummaryWire) => id)).toEqual([mine.id])
    await one.get(`${system.url}/checks/${mine.id}`).expect(200)
    await other.get(`${system.url}/checks/${mine.id}`).expect(404)
    expect((await list()).items.some(({ id }) => id === mine.id)).toBe(true)
  })

  it('refuses a cursor of its own making, an unknown parameter, and a stranger', async () => {
    for (const query of ['?cursor=nonsense', '?limit=0', '?limit=201', '?state=fail']) {
      await test.people.engineer.get(`${system.url}/checks${query}`).expect(400)
    }
    await test.people.stranger.get(`${system.url}/checks`).expect(404)
    await test.anonymous.get(`${system.url}/checks`).expect(401)
  })
})
