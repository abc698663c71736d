import { and, eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { createRepositories } from '#api/repositories.ts'
import { breaches } from '#drizzle/schema/breaches.ts'
import { revisions } from '#drizzle/schema/revisions.ts'
import { systemHeads, systems } from '#drizzle/schema/systems.ts'
import { recheck } from '#shared/checks/recheck.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())
beforeEach(async () => {
  system = await createSampleSystem(test)
})

/** Park and Miller's minimal standard generator: the same run every time. */
function createRandom(seed: number) {
  let state = seed
  return (below: number) => {
    state = (state * 48_271) % 2_147_483_647
    return state % below
  }
}

const SEED = 20_261_127
const EDITS = 40
const ALL = '?status=open&status=waived&status=resolved&limit=200'

describe('the breach log', () => {
  it(`answers what a check answers after each of ${EDITS} edits (seed ${SEED})`, async () => {
    const below = createRandom(SEED)
    const grey = () => `#${(16 + below(220)).toString(16).padStart(2, '0').repeat(3)}`
    const names = ['one', 'two', 'three', 'four']
    for (const name of names) await system.addToken(name, grey(), { states: ['hover'] })
    await system.addToken('five', '{one}', { states: ['hover'] })
    const pairs: string[] = []
    for (const foreground of [...names, 'five']) {
      pairs.push(await system.addPair({ foreground, background: 'paper', use: 'text' }))
    }
    await system.putTheme('dark', {
      name: 'Dark',
      ground: 'paper',
      ink: 'ink',
      rule: { kind: 'mirror' },
      values: { paper: { rest: '#111111' }, ink: { rest: '#ffffff' } },
    })
    const edits = [
      () => system.editToken(names[below(4)] ?? '', { value: grey() }),
      () => system.editToken('paper', { value: below(2) ? '#ffffff' : '#dddddd' }),
      () => system.editPair(pairs[below(5)] ?? '', { use: below(2) ? 'text' : 'large-text' }),
      () => system.editPair(pairs[below(5)] ?? '', { themes: below(2) ? null : ['light'] }),
      () => system.editPair(pairs[below(5)] ?? '', { states: below(2) ? null : ['rest'] }),
      () => system.patchTheme('dark', { gating: below(2) === 1 }),
      () => system.patchTheme('dark', { level: below(2) ? 'AAA' : null }),
      () => system.editToken('five', { value: below(2) ? '{two}' : grey() }),
    ]
    for (let edit = 0; edit < EDITS; edit += 1) {
      await edits[below(edits.length)]?.()
      expect(await logged(), `edit ${edit}`).toEqual(await measured())
    }
    const ever = await system.breaches(ALL)
    expect(ever.map(({ number }) => number)).toEqual(ever.map((_, at) => at + 1))
    expect(ever.filter(({ status }) => status === 'resolved').length).toBeGreaterThan(2)
  }, 120_000)

  it('says the same after another engine measured, and closes what that engine passes', async () => {
    await system.addToken('soft', '#aaaaaa')
    await system.addToken('dim', '#767676')
    await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
    await system.addPair({ foreground: 'dim', background: 'paper', use: 'text' })
    const id = await systemId()
    const { evaluation, model, revision } = await test.services.heads.current(id)
    // Another engine is stood in for by other colours: what it measures differs, the system does not.
    const swapped = model.tokens.map((token) => {
      const other = { soft: 'dim', dim: 'soft' }[token.name]
      const value = model.tokens.find(({ name }) => name === other)?.value
      return value === undefined ? token : { ...token, value }
    })
    const after = recheck(evaluation, { tokens: { put: swapped } })
    if (!after.ok) throw new TypeError('It cannot be resolved')
    const record = (measuredNow: typeof evaluation) =>
      test.service.platform.transact((tx) =>
        test.services.breaches.recordHead(createRepositories(tx), {
          systemId: id,
          revision,
          at: new Date(),
          actor: null,
          before: null,
          after: measuredNow,
          cause: 'engine',
        }),
      )
    const untouched = await system.breaches(ALL)
    expect(await record(evaluation)).toEqual({ opened: 0, resolved: 0 })
    expect(await system.breaches(ALL)).toEqual(untouched)
    expect(await record(after.evaluation)).toEqual({ opened: 1, resolved: 1 })
    expect(await system.breaches(ALL)).toMatchObject([
      { foreground: 'soft', status: 'resolved', closingReason: 'engine-changed' },
      { foreground: 'dim', status: 'open', number: 2 },
    ])
  })

  it('is set against the head by the first write after another engine measured it', async () => {
    await system.addToken('soft', '#aaaaaa')
    await system.addToken('dim', '#777777')
    await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
    await system.addPair({ foreground: 'dim', background: 'paper', use: 'text' })
    await system.editToken('dim', { value: '#767676' })
    await measuredElsewhere(await systemId())
    await system.addToken('bystander', '#123456')
    expect(await system.breaches(ALL)).toMatchObject([
      { foreground: 'soft', status: 'open', lastSeenAt: null },
      { foreground: 'dim', status: 'resolved', closingReason: 'engine-changed' },
    ])
    expect(await logged()).toEqual(await measured())
    const settled = await system.breaches(ALL)
    await system.addToken('another', '#123456')
    expect(await system.breaches(ALL)).toEqual(settled)
  })
})

/** The head as an engine left it to which soft passed and dim fell short. */
async function measuredElsewhere(id: string): Promise<void> {
  const { db } = test.service.platform.database
  const last = (await test.services.heads.current(id)).revision
  const at = and(eq(revisions.systemId, id), eq(revisions.number, last))
  const [row] = await db.select().from(revisions).where(at)
  if (row === undefined) throw new TypeError('No such revision')
  await db.insert(revisions).values({ ...row, number: last + 1, engineVersion: '0.0.1' })
  await db
    .update(systemHeads)
    .set({ revision: last + 1 })
    .where(eq(systemHeads.systemId, id))
  const entries = await db.select().from(breaches).where(eq(breaches.systemId, id))
  for (const entry of entries) {
    const isOpen = entry.names.foreground === 'dim'
    await db
      .update(breaches)
      .set(
        isOpen
          ? { status: 'open', resolvedAt: null, lastSeenAt: null, closingReason: null }
          : { status: 'resolved', resolvedAt: row.at, lastSeenAt: row.at, closingReason: 'fixed' },
      )
      .where(eq(breaches.id, entry.id))
  }
}

type Seen = Pick<BreachWire, 'foreground' | 'theme' | 'state' | 'ratio' | 'required' | 'gating'>
const sameOrder = (rows: readonly Seen[]) =>
  rows
    .map(({ foreground, theme, state, ratio, required, gating }) =>
      JSON.stringify({ foreground, theme, state, ratio, required, gating }),
    )
    .toSorted()

const logged = async () => sameOrder(await system.breaches('?limit=200'))
const measured = async () => {
  const { findings } = await system.check()
  return sameOrder(findings.filter(({ outcome }) => outcome === 'breach'))
}

async function systemId(): Promise<string> {
  const key = system.url.split('/').at(-1) ?? ''
  const { db } = test.service.platform.database
  const [row] = await db.select({ id: systems.id }).from(systems).where(eq(systems.key, key))
  return row?.id ?? ''
}
