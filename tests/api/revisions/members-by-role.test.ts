import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { patchPairBody } from '#shared/contracts/pairs.contract.ts'
import type { patchSystemBody } from '#shared/contracts/systems.contract.ts'
import type { patchThemeBody } from '#shared/contracts/themes.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

/** Who may set a member at all: a maintainer, an accessibility lead, or either. */
type Whose = 'maintainer' | 'lead' | 'both'

interface Row {
  readonly whose: Whose
  /** A value that asks for no less than what stands, and one that stands. */
  readonly to: unknown
  readonly back: unknown
}

let test: TestApp
let system: SampleSystem
let pair: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('deck', '#ffffff')
  await system.putTheme('dark', {
    name: 'Dark',
    ground: 'paper',
    ink: 'ink',
    values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
  })
  await system.putTheme('night', {
    name: 'Night',
    from: 'dark',
    ground: 'paper',
    ink: 'ink',
    values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
  })
  pair = await system.addPair({ foreground: 'ink', background: 'paper', use: 'large-text' })
})
afterAll(() => test.close())

const exempt = { kind: 'logotype', reason: 'The line of the brand name' }

const PAIR: Record<keyof typeof patchPairBody.shape, Row | null> = {
  foreground: { whose: 'maintainer', to: 'deck', back: 'ink' },
  background: { whose: 'maintainer', to: 'deck', back: 'paper' },
  use: { whose: 'maintainer', to: 'text', back: 'large-text' },
  relation: { whose: 'maintainer', to: 'together', back: 'inside' },
  backdrop: { whose: 'maintainer', to: ['deck'], back: null },
  states: { whose: 'maintainer', to: ['rest', 'hover'], back: null },
  themes: { whose: 'maintainer', to: ['light'], back: null },
  level: { whose: 'both', to: 'AAA', back: null },
  minimum: { whose: 'maintainer', to: 9, back: null },
  anyOf: { whose: 'maintainer', to: 'ring', back: null },
  product: { whose: 'maintainer', to: 'kiosk', back: null },
  exempt: { whose: 'lead', to: exempt, back: null },
  message: null,
}
const THEME: Record<keyof typeof patchThemeBody.shape, Row | null> = {
  name: { whose: 'maintainer', to: 'Dusk', back: 'Night' },
  from: { whose: 'maintainer', to: 'light', back: 'dark' },
  ground: null,
  ink: null,
  rule: { whose: 'maintainer', to: { kind: 'mirror' }, back: { kind: 'keep' } },
  level: { whose: 'both', to: 'AAA', back: null },
  gating: { whose: 'both', to: false, back: true },
  values: { whose: 'maintainer', to: { deck: { rest: '#222222' } }, back: { deck: null } },
  message: null,
}
const SYSTEM: Record<keyof typeof patchSystemBody.shape, Row | null> = {
  name: { whose: 'maintainer', to: 'Quay', back: 'Ferries' },
  writeMode: { whose: 'both', to: 'review', back: 'direct' },
  protectedBranches: { whose: 'both', to: [{ repository: 'quay/*', branch: 'main' }], back: [] },
  level: { whose: 'both', to: 'AAA', back: 'AA' },
  p3: { whose: 'maintainer', to: true, back: false },
  p3Gates: { whose: 'maintainer', to: true, back: false },
  disabledFloor: { whose: 'maintainer', to: 2, back: null },
  message: null,
}

/** Members that weaken by being set, by being set back, or both: a maintainer does not alone. P3 is off here. */
const WEAKENS: Readonly<Record<string, 'to' | 'back' | 'both'>> = {
  foreground: 'both',
  background: 'both',
  relation: 'to',
  backdrop: 'both',
  states: 'to',
  themes: 'to',
  gating: 'to',
  use: 'back',
  level: 'back',
  minimum: 'back',
  p3: 'back',
  disabledFloor: 'back',
}

const rowsOf = (table: Readonly<Record<string, Row | null>>) =>
  Object.entries(table).flatMap(([member, row]) => (row ? [[member, row] as const] : []))

const BODIES = [
  ['a pair', () => `${system.url}/pairs/${pair}`, rowsOf(PAIR)],
  ['a theme', () => `${system.url}/themes/night`, rowsOf(THEME)],
  ['a system', () => system.url, rowsOf(SYSTEM)],
] as const

describe.each(BODIES)('of %s', (_, url, rows) => {
  const send = async (person: 'maintainer' | 'lead' | 'admin', body: object) => {
    const { headers } = await system.maintainer.get(url()).expect(200)
    const answer = await test.people[person]
      .patch(url())
      .set('If-Match', String(headers.etag))
      .send(body)
    return [answer.status, answer.body.type] as const
  }
  const expected = (person: 'maintainer' | 'lead', { whose }: Row, weakens: boolean) => {
    if (whose !== 'both' && whose !== person) return [403, '/problems/role-missing']
    if (person === 'maintainer' && weakens) return [403, '/problems/weakening-needs-approval']
    return [200, undefined]
  }

  it.each(rows)('%s: answers whom it belongs to, refuses the others', async (member, row) => {
    for (const way of ['to', 'back'] as const) {
      for (const person of ['maintainer', 'lead'] as const) {
        const weakens = [way, 'both'].includes(WEAKENS[member] ?? '')
        const ends = way === 'back' && (member === 'writeMode' || member === 'protectedBranches')
        const wanted =
          ends && person === 'maintainer'
            ? [403, '/problems/role-missing']
            : expected(person, row, weakens)
        expect(await send(person, { [member]: row[way] }), `${person} ${way}`).toEqual(wanted)
        if (wanted[0] === 200) await send('admin', { [member]: way === 'to' ? row.back : row.to })
      }
      expect(await send('admin', { [member]: row[way] }), `admin ${way}`).toEqual([200, undefined])
    }
  })
})

describe('what is made and removed', () => {
  it('leaves the declaration of pairs to maintainers, exempt ones to the lead', async () => {
    const declare = (person: 'maintainer' | 'lead', body: object) =>
      test.people[person]
        .post(`${system.url}/pairs`)
        .send({ foreground: 'deck', background: 'ink', use: 'text', ...body })
    expect((await declare('lead', {})).body.type).toBe('/problems/role-missing')
    expect((await declare('maintainer', { exempt })).body.type).toBe('/problems/role-missing')
    expect((await declare('maintainer', { anyOf: 'ring' })).status).toBe(201)
    // Exempt or not, it would let another pair off: that is not the lead's own edit.
    const joining = await declare('lead', { exempt, anyOf: 'ring', product: 'kiosk' })
    expect(joining.body.type).toBe('/problems/weakening-needs-approval')
    expect(joining.body.errors.map(({ code }: { code: string }) => code)).toEqual(['any-of-joined'])
    expect((await declare('lead', { exempt })).status).toBe(201)
  })

  it('refuses the lead themes, pairs, tokens and rules that come or go', async () => {
    const { lead } = test.people
    const tagged = async (path: string) =>
      String((await lead.get(`${system.url}${path}`).expect(200)).headers.etag)
    const theme = { name: 'Dusk', ground: 'paper', ink: 'ink' }
    const answers = [
      await lead.put(`${system.url}/themes/dusk`).set('If-None-Match', '*').send(theme),
      await lead
        .delete(`${system.url}/themes/night`)
        .set('If-Match', await tagged('/themes/night')),
      await lead
        .delete(`${system.url}/pairs/${pair}`)
        .set('If-Match', await tagged(`/pairs/${pair}`)),
      await lead.post(`${system.url}/tokens`).send({ name: 'new', value: '#000' }),
      await lead
        .patch(`${system.url}/tokens/deck`)
        .set('If-Match', await tagged('/tokens/deck'))
        .send({ locked: true }),
      await lead
        .put(`${system.url}/rules`)
        .set('If-Match', await tagged('/rules'))
        .send({ states: {}, prefixes: [] }),
    ]
    for (const { status, body } of answers) {
      expect([status, body.type]).toEqual([403, '/problems/role-missing'])
    }
  })
})
