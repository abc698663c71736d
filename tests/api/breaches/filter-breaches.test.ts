import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { BREACH_SORTS } from '#shared/contracts/breach-filter.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

/** Filters and orders of listBreaches, on a log of both origins. */
let test: TestApp
let system: SampleSystem
let all: BreachWire[]
const SOURCE = { repository: 'larkhaven/timetable', branch: 'main' }
const ANY = 'status=open&status=resolved&status=waived'

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  const declare = async (name: string, value: string, use: string, background = 'paper') => {
    await system.addToken(name, value)
    await system.addPair({ foreground: name, background, use })
  }
  await system.addToken('deck', '#eeeeee')
  await declare('text.soft', '#aaaaaa', 'text')
  await declare('text.Faint', '#bbbbbb', 'large-text')
  await declare('mark.100%_dim', '#cccccc', 'non-text', 'deck')
  await declare('text.grey', '#999999', 'text')
  await system.editToken('text.grey', { value: '#000000' })
  await declare('text.late', '#888888', 'text')
  await system.editToken('text.late', { value: '#cccccc' })
  await system.editToken('text.late', { value: '#777777' })
  const { pool } = test.service.platform.database
  await system.patchSettings({ protectedBranches: [SOURCE] })
  await system.check({
    tokens: { 'new ink': dtcgHex('dddddd') },
    pairs: [{ foreground: 'new ink', background: 'paper', use: 'text' }],
    source: SOURCE,
  })
  await pool.query(
    'update breaches set first_seen_at = first_seen_at - interval 60 day where number <= 2',
  )
  const { body } = await test.people.lead.get(`${system.url}/members`).expect(200)
  const tove = body.items.find(({ name }: { name: string }) => name === 'Tove Lind').id
  all = await system.breaches(`?${ANY}`)
  const patch = test.people.lead.patch(`${system.url}/breaches/${all[0]?.id}`)
  await patch.set('If-Match', String(all[0]?.etag)).send({ assignee: tove }).expect(200)
  all = await system.breaches(`?${ANY}`)
})
afterAll(() => test.close())

const found = async (query: string, agent = test.people.engineer) => {
  const { body } = await agent.get(`${system.url}/breaches?${query}`).expect(200)
  const items: BreachWire[] = body.items
  expect(body.total).toBe(items.length)
  return items.map(({ foreground, origin }) => (origin === 'ci' ? `ci ${foreground}` : foreground))
}
const days = (count: number) => new Date(Date.now() - count * 86_400_000).toISOString()

describe('listBreaches', () => {
  it('answers those of a use, of a pair, or of one of its sides', async () => {
    expect(await found('use=large-text')).toEqual(['text.Faint'])
    expect(await found('kind=text&use=non-text')).toEqual([])
    expect(await found('background=deck')).toEqual(['mark.100%_dim'])
    expect(await found('foreground=text.soft&background=paper&origin=head')).toEqual(['text.soft'])
    expect(await found('foreground=text.soft&background=deck')).toEqual([])
    expect(await found('foreground=paper')).toEqual([])
  })

  it('answers those of a person, of oneself, or of nobody', async () => {
    const tove = all[0]?.assignee?.id ?? ''
    expect(await found(`assignee=${tove}`)).toEqual(['text.soft'])
    expect(await found('assignee=me')).toEqual(['text.soft'])
    expect(await found('assignee=me', test.people.lead)).toEqual([])
    expect(await found('assignee=none')).not.toContain('text.soft')
    expect(await found('assignee=none&use=large-text')).toEqual(['text.Faint'])
  })

  it('answers those of an age', async () => {
    expect(await found(`before=${days(30)}`)).toEqual(['text.soft', 'text.Faint'])
    expect(await found(`since=${days(30)}&origin=head`)).toEqual(['mark.100%_dim', 'text.late'])
    expect(await found(`before=${days(30).slice(0, 10)}`)).toHaveLength(2)
    expect(await found(`since=${days(90)}&before=${days(61)}`)).toEqual([])
    const instant = encodeURIComponent('2026-01-01T00:00:00+02:00')
    expect((await found(`since=${instant}`)).length).toBeGreaterThan(0)
  })

  it('answers those of an origin, a repository or a branch', async () => {
    expect(await found('origin=ci')).toContain('ci new ink')
    expect(await found(`repository=${SOURCE.repository}&token=new ink`)).toEqual(['ci new ink'])
    expect(await found('branch=main&origin=head')).toEqual([])
    expect(await found('repository=elsewhere')).toEqual([])
  })

  it('answers what a part of a name or a number speaks of, whatever its letters', async () => {
    expect(await found('q=FAINT&origin=head')).toEqual(['text.Faint'])
    expect(await found('q=new%20INK')).toEqual(['ci new ink'])
    expect(await found('q=100%25_&origin=head')).toEqual(['mark.100%_dim'])
    expect(await found('q=1000_&origin=head')).toEqual([])
    expect(await found('q=text_soft')).toEqual([])
    expect(await found('q=%235&origin=head')).toEqual(['text.late'])
    expect(await found("q=' or 1=1 --")).toEqual([])
  })

  it('answers in the order that is asked for', async () => {
    const by = (sort: string) => found(`${ANY}&origin=head&sort=${sort}`)
    const head = all.filter(({ origin }) => origin === 'head')
    const sortedBy = (value: (breach: BreachWire) => number) =>
      head
        .toSorted((a, b) => value(a) - value(b) || a.number - b.number)
        .map(({ foreground }) => foreground)
    expect(await by('ratio')).toEqual(sortedBy(({ ratio }) => ratio))
    expect(await by('lowest-ratio')).toEqual(sortedBy(({ lowestRatio }) => lowestRatio))
    expect(await by('shortfall')).toEqual(sortedBy(({ ratio, required }) => ratio / required))
    expect(await by('-resolved')).toEqual(
      sortedBy(({ resolvedAt }) => -Date.parse(resolvedAt ?? '1970-01-01')),
    )
    expect(await by('-first-seen')).toEqual(sortedBy(({ number }) => -number))
    // The orders differ on this log, so that none passes for another.
    const orders = ['ratio', 'lowest-ratio', 'shortfall', '-resolved', '-first-seen', 'number']
    const answers = await Promise.all(orders.map(by))
    expect(new Set(answers.map((answer) => answer.join())).size).toBe(orders.length)
  })

  it.each(BREACH_SORTS)('answers every entry once, page by page by %s', async (sort) => {
    const seen: number[] = []
    let next = `${system.url}/breaches?${ANY}&sort=${sort}&limit=2`
    while (next !== '') {
      const { body, headers } = await test.people.engineer.get(next).expect(200)
      seen.push(...body.items.map(({ number }: BreachWire) => number))
      next = /<([^>]+)>; rel="next"/.exec(String(headers.link))?.[1] ?? ''
    }
    const whole = await system.breaches(`?${ANY}&sort=${sort}`)
    expect(seen).toEqual(whole.map(({ number }) => number))
    expect(new Set(seen).size).toBe(all.length)
  })

  it('refuses the cursor of another order, and what is no moment', async () => {
    const { headers } = await test.people.engineer.get(`${system.url}/breaches?limit=1`).expect(200)
    const cursor = /cursor=([^&>]+)/.exec(String(headers.link))?.[1]
    const { body } = await test.people.engineer
      .get(`${system.url}/breaches?sort=ratio&cursor=${cursor}`)
      .expect(400)
    expect(body.errors).toEqual([{ parameter: 'cursor', detail: 'It belongs to sort=first-seen' }])
    for (const moment of ['yesterday', '2026-13-01', '2026-01-01T00:00:00', '1']) {
      await test.people.engineer.get(`${system.url}/breaches?since=${moment}`).expect(400)
    }
  })
})
