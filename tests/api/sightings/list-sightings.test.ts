import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { SightingWire } from '#shared/contracts/sightings.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const TOPIC = { repository: 'larkhaven/timetable', branch: 'winter-blue' }
const PALE = { soft: dtcgHex('aaaaaa') }

beforeEach(async () => {
  system = await createSampleSystem(test)
  await system.addToken('soft', '#666666')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
})

const run = async (statement: string, values: unknown[] = []) => {
  const [rows] = await test.service.platform.database.pool.query(statement, values)
  return rows as Record<string, unknown>[]
}
const list = async (query = '') => {
  const { body, headers } = await test.people.lead.get(`${system.url}/sightings${query}`)
  const items: SightingWire[] = body.items
  return { items, total: body.total, next: /<([^>]+)>/.exec(String(headers.link))?.[1] }
}
const see = (source: object = TOPIC, tokens: object = PALE) => system.check({ tokens, source })
const age = (days: number, branch = TOPIC.branch) =>
  run(
    `update ci_sightings set first_seen_at = first_seen_at - interval ? day,
      last_seen_at = last_seen_at - interval ? day where branch = ?`,
    [days, days, branch],
  )

describe('listSightings', () => {
  it('answers one row a repository, branch and identity: first, last, count and last commit', async () => {
    await see({ ...TOPIC, commit: 'aaaa' })
    const [first] = (await list()).items
    const check = await see({ ...TOPIC, commit: 'bbbb' }, { soft: dtcgHex('bbbbbb') })
    const { items, total } = await list()
    expect(total).toBe(1)
    expect(items).toMatchObject([
      {
        ...TOPIC,
        protected: false,
        foreground: 'soft',
        background: 'paper',
        kind: 'text',
        use: 'text',
        theme: 'light',
        state: 'rest/rest',
        required: 4.5,
        rendered: { foreground: '#bbbbbb', background: '#ffffff' },
        count: 2,
        lastCommit: 'bbbb',
        lastCheck: check.id,
        fingerprint: check.findings[0]?.fingerprint,
        firstSeenAt: first?.firstSeenAt,
      },
    ])
    expect(items[0]?.ratio).toBe(check.findings[0]?.ratio)
    expect(items[0]).not.toHaveProperty('breach')
    expect(Date.parse(items[0]?.lastSeenAt ?? '')).toBeGreaterThan(
      Date.parse(first?.lastSeenAt ?? ''),
    )
  })

  it('answers a count that is exact under parallel checks', async () => {
    await Promise.all(Array.from({ length: 15 }, () => see()))
    expect((await list()).items).toMatchObject([{ count: 15 }])
  })

  it('answers one count to a check that is sent again with its Idempotency-Key', async () => {
    const send = () =>
      system.maintainer
        .post(`${system.url}/checks`)
        .set('Idempotency-Key', '"pipeline 17"')
        .send({ tokens: PALE, source: TOPIC })
        .expect(200)
    const [first, second] = [await send(), await send()]
    expect(second.body).toEqual(first.body)
    expect((await list()).items).toMatchObject([{ count: 1 }])
  })

  it('leaves nothing of a check that is refused', async () => {
    await system.maintainer
      .post(`${system.url}/checks`)
      .send({ tokens: { soft: { $type: 'color', $value: 'no colour' } }, source: TOPIC })
      .expect(422)
    expect((await list()).items).toEqual([])
  })

  it('answers what newOnly calls known', async () => {
    await system.editToken('soft', { value: '#aaaaaa' })
    const answer = await system.check({ newOnly: true, source: TOPIC })
    expect(answer).toMatchObject({ verdict: 'pass', logged: { seen: 1 } })
    expect((await list()).items).toMatchObject([{ count: 1 }])
  })

  it('leaves a row as it is when a later check passes', async () => {
    await see()
    await see(TOPIC, {})
    expect((await list()).items).toMatchObject([{ count: 1 }])
  })

  it('answers what a repository, a branch, a theme, a token or a time asks for', async () => {
    await see()
    await see({ ...TOPIC, branch: 'glare' })
    await see({ repository: 'larkhaven/kiosk', branch: 'glare' })
    const found = async (query: string) =>
      (await list(query)).items.map(({ repository, branch }) => `${repository} ${branch}`)
    expect(await found('?repository=larkhaven/kiosk')).toEqual(['larkhaven/kiosk glare'])
    expect(await found('?branch=glare')).toHaveLength(2)
    expect(await found('?token=soft')).toHaveLength(3)
    expect(await found('?token=ink')).toEqual([])
    expect(await found('?theme=light')).toHaveLength(3)
    expect(await found('?theme=dark')).toEqual([])
    expect(await found('?protected=true')).toEqual([])
    expect(await found('?protected=false')).toHaveLength(3)
    await age(3, 'winter-blue')
    const since = new Date(Date.now() - 86_400_000).toISOString()
    expect(await found(`?since=${since}`)).toHaveLength(2)
    expect((await found('?sort=first-seen'))[0]).toBe('larkhaven/timetable winter-blue')
    expect((await found('?sort=-last-seen')).at(-1)).toBe('larkhaven/timetable winter-blue')
  })

  it.each(['first-seen', '-first-seen', '-last-seen'])(
    'answers every sighting once, page by page by %s, while more come',
    async (sort) => {
      const pale = ['one', 'two', 'three', 'four', 'five']
      for (const name of pale) {
        await system.addToken(name, '#000000')
        await system.addPair({ foreground: name, background: 'paper', use: 'text' })
      }
      await see(TOPIC, Object.fromEntries(pale.map((name) => [name, dtcgHex('aaaaaa')])))
      const seen: string[] = []
      let page = await list(`?sort=${sort}&limit=2`)
      for (;;) {
        seen.push(...page.items.map(({ foreground }) => foreground))
        if (page.next === undefined) break
        await see({ repository: 'larkhaven/crew', branch: `b${seen.length}` })
        const query = page.next.slice(page.next.indexOf('?'))
        page = await list(query)
      }
      expect(seen.filter((name) => name !== 'soft').toSorted()).toEqual(pale.toSorted())
    },
  )

  it('refuses a cursor of another order or of its own making, and a stranger as absent', async () => {
    await see()
    await see({ ...TOPIC, branch: 'glare' })
    const { next } = await list('?limit=1')
    await test.people.lead.get(`${next}&sort=first-seen`).expect(400)
    await test.people.lead.get(`${system.url}/sightings?cursor=e30`).expect(400)
    await test.people.lead.get(`${system.url}/sightings?protected=perhaps`).expect(400)
    await test.people.stranger.get(`${system.url}/sightings`).expect(404)
  })
})

describe('a branch that is not protected', () => {
  it('is kept for 30 days after it was seen last, by the database’s clock', async () => {
    await see()
    await age(29)
    expect((await list()).items).toHaveLength(1)
    await age(1)
    expect((await list()).items).toEqual([])
    expect((await list()).total).toBe(0)
  })

  it('counts from one when it is seen again after that', async () => {
    await see()
    await see()
    await age(31)
    await see()
    const { items } = await list()
    expect(items).toMatchObject([{ count: 1 }])
    expect(items[0]?.firstSeenAt).toBe(items[0]?.lastSeenAt)
  })

  it('leaves its rows when a check of any other branch is kept', async () => {
    await see()
    await age(31)
    const rows = async () => run('select * from ci_sightings where branch = ?', [TOPIC.branch])
    expect(await rows()).not.toEqual([])
    await see({ ...TOPIC, branch: 'glare' })
    expect(await rows()).toEqual([])
  })
})

describe('a protected branch', () => {
  it('is kept, and its sighting leads to the breach', async () => {
    await system.patchSettings({ protectedBranches: [TOPIC] })
    await see()
    await age(400)
    const { items } = await list('?protected=true')
    const [breach] = await system.breaches('?origin=ci')
    expect(items).toMatchObject([
      { protected: true, breach: { id: breach?.id, number: breach?.number } },
    ])
    await see({ ...TOPIC, branch: 'glare' })
    expect((await list('?protected=true')).items).toHaveLength(1)
  })
})
