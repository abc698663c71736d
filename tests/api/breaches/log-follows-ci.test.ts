import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const MAIN = { repository: 'larkhaven/timetable', branch: 'main' }
const TOPIC = { repository: 'larkhaven/timetable', branch: 'winter-blue' }
const PALE = { soft: dtcgHex('aaaaaa') }
const ALL = '?status=open&status=waived&status=resolved&origin=ci'

/** `soft` on paper, 5.74 on the head; `main` and release branches of any repository are protected. */
beforeEach(async () => {
  system = await createSampleSystem(test)
  await system.addToken('soft', '#666666')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
  await protect([{ repository: '*', branch: 'main' }])
})

const protect = (protectedBranches: readonly object[]) =>
  system.patchSettings({ protectedBranches })
const logged = () => system.breaches(ALL)
const check = (body: object, source: object = MAIN): Promise<CheckWire> =>
  system.check({ source, ...body })

describe('a check of a protected branch', () => {
  it('opens a breach that names repository, branch and the check', async () => {
    const answer = await check({ tokens: PALE, source: { ...MAIN, commit: '4be1d02' } })
    expect(answer.logged).toEqual({ protected: true, seen: 1, opened: 1, resolved: 0 })
    const [breach, ...others] = await logged()
    expect(others).toEqual([])
    expect(breach).toMatchObject({
      ...MAIN,
      origin: 'ci',
      foreground: 'soft',
      background: 'paper',
      status: 'open',
      required: 4.5,
      number: 1,
    })
    // ACT rule afw4f7, failed example 1: #aaa on #fff.
    expect(breach?.ratio).toBeCloseTo(2.3231, 4)
    expect(breach?.lastSeenAt).toBe(breach?.firstSeenAt)
    expect(breach).not.toHaveProperty('firstSeenRevision')
    const whole = await test.people.engineer.get(`${system.url}/breaches/${breach?.id}`).expect(200)
    expect(whole.body.events).toMatchObject([{ kind: 'opened', check: answer.id }])
    expect((await system.breaches('?origin=head')).length).toBe(0)
  })

  it('leaves one entry however often it is seen, and says by when', async () => {
    await check({ tokens: PALE })
    const [first] = await logged()
    const again = await check({ tokens: PALE })
    expect(again.logged).toEqual({ protected: true, seen: 1, opened: 0, resolved: 0 })
    const [second, ...others] = await logged()
    expect(others).toEqual([])
    expect(Date.parse(String(second?.lastSeenAt))).toBeGreaterThan(
      Date.parse(String(first?.lastSeenAt)),
    )
    expect(second?.firstSeenAt).toBe(first?.firstSeenAt)
    expect(second?.etag).not.toBe(first?.etag)
  })

  it('tells repositories and branches apart, and the head from both', async () => {
    await protect([
      { repository: 'larkhaven/*', branch: 'main' },
      { repository: 'larkhaven/timetable', branch: 'release/*' },
    ])
    await check({ tokens: PALE })
    await check({ tokens: PALE }, { repository: 'larkhaven/kiosk', branch: 'main' })
    await check({ tokens: PALE }, { repository: 'larkhaven/timetable', branch: 'release/3' })
    await check({ tokens: PALE }, { repository: 'larkhaven/kiosk', branch: 'release/3' })
    await check({ tokens: PALE }, { repository: 'elsewhere/timetable', branch: 'main' })
    const places = (await logged()).map(({ repository, branch }) => `${repository} ${branch}`)
    expect(places).toEqual([
      'larkhaven/timetable main',
      'larkhaven/kiosk main',
      'larkhaven/timetable release/3',
    ])
    await system.editToken('soft', { value: '#aaaaaa' })
    expect(await system.breaches('?origin=head')).toHaveLength(1)
  })

  it('takes a whole ref for the branch that it names', async () => {
    await check({ tokens: PALE }, { ...MAIN, branch: 'refs/heads/main' })
    await check({ tokens: PALE })
    expect(await logged()).toMatchObject([MAIN])
  })

  it('leaves what the head has as well, and no lower, to the entry of the head', async () => {
    await system.editToken('soft', { value: '#aaaaaa' })
    const answer = await check({})
    expect(answer).toMatchObject({ verdict: 'fail', counts: { breach: 1 } })
    expect(answer.logged).toEqual({ protected: true, seen: 1, opened: 0, resolved: 0 })
    expect((await check({ newOnly: true })).logged).toEqual(answer.logged)
    expect((await check({ tokens: { soft: dtcgHex('999999') } })).logged).toEqual(answer.logged)
    expect(await logged()).toEqual([])
    const lower = await check({ tokens: { soft: dtcgHex('bbbbbb') } })
    expect(lower.logged).toMatchObject({ opened: 1 })
    expect(await logged()).toMatchObject([{ status: 'open', rendered: { foreground: '#bbbbbb' } }])
  })

  it('leaves an entry open where newOnly lets it pass as known', async () => {
    await check({ tokens: PALE })
    await system.editToken('soft', { value: '#aaaaaa' })
    const answer = await check({ newOnly: true })
    expect(answer).toMatchObject({ verdict: 'pass', counts: { known: 1 } })
    expect(answer.logged).toMatchObject({ seen: 1, resolved: 0 })
    expect(await logged()).toMatchObject([{ status: 'open' }])
    await system.editToken('soft', { value: '#666666' })
    expect((await check({ newOnly: true })).logged).toMatchObject({ seen: 0, resolved: 1 })
  })

  it('logs a breach of a theme that only reports with gating false', async () => {
    await system.patchTheme('light', { gating: false })
    expect(await check({ tokens: PALE })).toMatchObject({ verdict: 'pass', logged: { opened: 1 } })
    expect(await logged()).toMatchObject([{ gating: false, status: 'open' }])
  })
})

describe('a later check of the same branch', () => {
  it('resolves what it measured and found to hold, also where it fails by another', async () => {
    await system.addToken('faint', '#666666')
    await system.addPair({ foreground: 'faint', background: 'paper', use: 'text' })
    await check({ tokens: { ...PALE, faint: dtcgHex('cccccc') } })
    const second = await check({ tokens: { faint: dtcgHex('cccccc') } })
    expect(second).toMatchObject({ verdict: 'fail', logged: { seen: 1, opened: 0, resolved: 1 } })
    expect(await logged()).toMatchObject([
      { foreground: 'soft', status: 'resolved', closingReason: 'fixed' },
      { foreground: 'faint', status: 'open' },
    ])
    const soft = (await logged())[0]
    expect(soft?.lastSeenAt).toBe(soft?.resolvedAt)
  })

  it('opens it again, as the same entry', async () => {
    await check({ tokens: PALE })
    await check({})
    const again = await check({ tokens: PALE })
    expect(again.logged).toMatchObject({ opened: 1 })
    const [breach, ...others] = await logged()
    expect(others).toEqual([])
    const { body } = await test.people.engineer.get(`${system.url}/breaches/${breach?.id}`)
    expect(body.events.map(({ kind }: { kind: string }) => kind)).toEqual([
      'opened',
      'resolved',
      'reopened',
    ])
  })

  it('leaves what it did not measure alone while it fails, and closes it when it passes', async () => {
    const own = { foreground: 'ink', background: 'soft', use: 'text' }
    const dark = { soft: dtcgHex('333333') }
    await check({ tokens: dark, pairs: [own] })
    expect(await logged()).toMatchObject([{ foreground: 'ink', background: 'soft' }])
    await check({ tokens: PALE })
    expect(await logged()).toMatchObject([{ status: 'open' }, { foreground: 'soft' }])
    await check({})
    expect(await logged()).toMatchObject([
      { foreground: 'ink', status: 'resolved', closingReason: 'pair-removed' },
      { foreground: 'soft', status: 'resolved', closingReason: 'fixed' },
    ])
  })

  it('leaves the entries of other branches, and of the head, alone', async () => {
    await check({ tokens: PALE })
    await check({}, { repository: 'larkhaven/kiosk', branch: 'main' })
    await check({}, TOPIC)
    await system.check({})
    expect(await logged()).toMatchObject([{ status: 'open' }])
  })

  it('closes what is open also where the branch is protected no longer, and opens nothing', async () => {
    await check({ tokens: PALE })
    await protect([])
    const own = { foreground: 'faint', background: 'paper', use: 'text' }
    const answer = await check({ tokens: { faint: dtcgHex('cccccc') }, pairs: [own] })
    expect(answer.logged).toEqual({ protected: false, seen: 1, opened: 0, resolved: 1 })
    expect(await logged()).toMatchObject([{ foreground: 'soft', status: 'resolved' }])
    expect((await check({ tokens: PALE })).logged).toMatchObject({ opened: 0 })
  })
})

describe('any other check', () => {
  it('opens nothing where the branch is not protected', async () => {
    const answer = await check({ tokens: PALE }, TOPIC)
    expect(answer.logged).toEqual({ protected: false, seen: 1, opened: 0, resolved: 0 })
    expect(await logged()).toEqual([])
  })

  it('logs nothing where the source leaves out repository or branch', async () => {
    for (const source of [undefined, { branch: 'main' }, { repository: MAIN.repository }]) {
      const answer = await system.check({ tokens: PALE, ...(source && { source }) })
      expect(answer).not.toHaveProperty('logged')
    }
    expect(await logged()).toEqual([])
  })
})

it('answers one entry and one opening to parallel checks of one branch', async () => {
  const answers = await Promise.all(Array.from({ length: 12 }, () => check({ tokens: PALE })))
  const opened = answers.map((answer) => answer.logged?.opened)
  expect(opened.toSorted()).toEqual([...Array<number>(11).fill(0), 1])
  expect(await logged()).toHaveLength(1)
  expect(new Set(answers.map(({ number }) => number)).size).toBe(12)
})

it('answers numbers without gap or repetition while the head opens breaches of its own', async () => {
  const names = Array.from({ length: 8 }, (_, at) => `faint-${at}`)
  for (const name of names) {
    await system.addToken(name, '#666666')
    await system.addPair({ foreground: name, background: 'paper', use: 'text' })
  }
  await Promise.all(
    names.flatMap((name, at) => [
      system.editToken(name, { value: '#aaaaaa' }),
      check({ tokens: { [name]: dtcgHex('bbbbbb') } }, { ...MAIN, repository: `r${at}` }),
    ]),
  )
  const all = await system.breaches('?status=open&status=resolved&sort=number')
  expect(all.map(({ number }) => number)).toEqual(all.map((_, at) => at + 1))
  expect(all.filter(({ origin }) => origin === 'head')).toHaveLength(names.length)
  expect(new Set(all.map(({ repository }) => repository)).size).toBe(names.length + 1)
})

it('takes a candidate’s token of the longest name', async () => {
  const name = `${'%/+'.repeat(84)}abc`
  const body = {
    tokens: { [name]: dtcgHex('aaaaaa') },
    pairs: [{ foreground: name, background: 'paper', use: 'text' }],
  }
  const answer = await check(body)
  expect(answer.logged).toMatchObject({ opened: 1 })
  const query = new URLSearchParams({ origin: 'ci', token: name })
  expect(await system.breaches(`?${query}`)).toMatchObject([{ foreground: name }])
})
