import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
})
beforeEach(async () => {
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const at = (name: string) => `${system.url}/tokens/${encodeURIComponent(name)}`
const read = async (name: string) => (await system.maintainer.get(at(name)).expect(200)).body
const patch = async (name: string, body: object) =>
  system.maintainer
    .patch(at(name))
    .set('If-Match', (await read(name)).etag)
    .send(body)
async function rowsOf(statement: string): Promise<RowDataPacket[]> {
  const connection = await createConnection(test.database.adminUrl)
  const [rows] = await connection.query<RowDataPacket[]>(statement)
  await connection.end()
  return rows
}
const headOf = async () => (await system.maintainer.get(system.url).expect(200)).body.head

describe('patchToken', () => {
  it('answers the breach that it opens, logs it, and answers it again when it is resolved', async () => {
    await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    await system.addToken('note', '#000000')
    await system.addPair({ foreground: 'note', background: 'paper', use: 'text' })
    const opening = await system.editToken('note', { value: '#777777', message: 'Softer' })
    // #777777 on white is 4.478 (WCAG 2.2 relative luminance), short of 4.5.
    expect(opening).toMatchObject({
      verdict: 'fail',
      opened: [{ foreground: 'note', background: 'paper', state: 'rest/rest', outcome: 'breach' }],
      resolved: [],
    })
    expect(opening.opened[0]?.ratio).toBeCloseTo(4.478, 3)
    const [breach] = await system.breaches()
    expect(breach).toMatchObject({ foreground: 'note', status: 'open', lastSeenAt: null })
    const closing = await system.editToken('note', { value: '#767676' })
    expect(closing).toMatchObject({
      verdict: 'pass',
      opened: [],
      resolved: [{ ratio: breach?.ratio }],
    })
    expect(await system.breaches('?status=resolved')).toMatchObject([
      { id: breach?.id, closingReason: 'fixed' },
    ])
  })

  it('makes one revision with author, message and what it was', async () => {
    const { revision } = await system.editToken('ink', { value: '#111111', message: 'Softer ink' })
    const { body } = await system.maintainer.get(`${system.url}/revisions/${revision}`).expect(200)
    expect(body).toMatchObject({
      number: revision,
      message: 'Softer ink',
      author: { name: 'Ines Marrow' },
      edits: [{ item: 'token', operation: 'edited', name: 'ink' }],
    })
    const { body: before } = await system.maintainer
      .get(`${system.url}/revisions/${revision - 1}`)
      .expect(200)
    const value = (tokens: { name: string; value: unknown }[]) =>
      tokens.find(({ name }) => name === 'ink')?.value
    expect(value(before.tokens)).not.toEqual(value(body.tokens))
  })

  it('leaves the revision where nothing changes', async () => {
    const { revision } = await headOf()
    const effect = await system.editToken('ink', { value: '#000000', states: [], locked: false })
    expect(effect).toMatchObject({ revision, opened: [], resolved: [] })
    expect((await headOf()).revision).toBe(revision)
  })

  it('leaves members that the body does not name, and removes those that are null', async () => {
    const deprecated = { reason: 'Old', replacement: 'paper', sunset: '2027-01-31' }
    const rules = { states: { hover: { lightness: 0.1, towards: 'ink' } } }
    await system.addToken('tag', '#aaaaaa', { description: 'A tag', rules, deprecated })
    await patch('tag', { states: ['hover'] })
    expect(await read('tag')).toMatchObject({ description: 'A tag', rules, deprecated })
    await patch('tag', { description: null, rules: null, deprecated: null })
    const bare = await read('tag')
    expect(bare).toMatchObject({ states: ['hover'] })
    expect(bare).not.toHaveProperty('description')
    expect(bare).not.toHaveProperty('rules')
    expect(bare).not.toHaveProperty('deprecated')
  })

  it('answers a rename, and everything that named the token follows', async () => {
    await system.addToken('old', '#222222')
    await system.addToken('follower', '{old}')
    const pair = await system.addPair({ foreground: 'old', background: 'paper', use: 'text' })
    await patch('old', { name: 'new' })
    expect((await read('follower')).value).toBe('{new}')
    const { body } = await system.maintainer.get(`${system.url}/pairs/${pair}`).expect(200)
    expect(body.foreground).toBe('new')
    await system.maintainer.get(at('old')).expect(404)
    const { body: list } = await system.maintainer.get(`${system.url}/tokens`).expect(200)
    expect(list.items.map(({ name }: { name: string }) => name)).toEqual([
      'paper',
      'ink',
      'new',
      'follower',
    ])
  })

  it('refuses a rename to a name that is taken', async () => {
    const { status, body } = await patch('ink', { name: 'paper' })
    expect([status, body.type]).toEqual([409, '/problems/token-name-taken'])
  })

  it('refuses an edit without If-Match, and answers a stale one what stands there now', async () => {
    await system.maintainer.patch(at('ink')).send({ description: 'x' }).expect(428)
    const { etag } = await read('ink')
    await system.editToken('ink', { description: 'meanwhile' })
    const stale = await system.maintainer
      .patch(at('ink'))
      .set('If-Match', etag)
      .send({ description: 'x' })
      .expect(412)
    expect(stale.body.current).toEqual(await read('ink'))
    expect((await read('ink')).description).toBe('meanwhile')
  })

  it('refuses to move the colours of a locked token until its own edit unlocks it', async () => {
    await patch('ink', { locked: true })
    for (const body of [
      { value: '#111111' },
      { states: ['hover'] },
      { values: { light: { hover: '#111111' } } },
      { rules: { states: { hover: { lightness: 0.2 } } } },
    ]) {
      const refused = await patch('ink', body)
      expect([refused.status, refused.body.type]).toEqual([409, '/problems/token-locked'])
      expect(refused.body.detail).toBe(
        'ink is locked: send "locked": false with this edit, or before it',
      )
    }
    expect((await patch('ink', { description: 'May be told' })).status).toBe(200)
    expect((await patch('ink', { locked: false, value: '#111111' })).status).toBe(200)
  })

  it('refuses what cannot be resolved: a cycle, with the names of its path', async () => {
    await system.addToken('a', '#222222')
    await system.addToken('b', '{a}')
    const { status, body } = await patch('a', { value: '{b}' })
    expect([status, body.type]).toEqual([422, '/problems/system-unresolvable'])
    expect(body.errors[0]).toMatchObject({ pointer: '/value', code: 'reference-cycle' })
    expect(body.errors[0].detail).toMatch(/a.*b/)
    expect((await read('a')).value).toMatchObject({ colorSpace: 'oklch' })
  })

  it('refuses to take from a theme its own ground, pointing at the values', async () => {
    const values = { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } }
    await system.putTheme('dark', { name: 'Dark', ground: 'paper', ink: 'ink', values })
    const { status, body } = await patch('paper', { values: {} })
    expect(status).toBe(422)
    expect(body.errors[0]).toMatchObject({ pointer: '/values', code: 'theme-unset' })
  })

  it('refuses a ground and ink that come closer than 4.5 to 1', async () => {
    const { status, body } = await patch('ink', { value: '#999999' })
    expect(status).toBe(422)
    expect(body.errors).toMatchObject([{ pointer: '/value', code: 'theme-span' }])
  })

  it('answers a key with tokens:write as its owner, and logs the key', async () => {
    const { body: key } = await system.maintainer
      .post(`${system.url}/keys`)
      .send({ name: 'Nightly import', scopes: ['tokens:write'] })
      .expect(201)
    const { body } = await test
      .withKey(key.key)
      .patch(at('ink'))
      .set('If-Match', (await read('ink')).etag)
      .send({ value: '#020202' })
      .expect(200)
    const { body: revision } = await system.maintainer.get(
      `${system.url}/revisions/${body.effect.revision}`,
    )
    expect(revision.author.name).toBe('Ines Marrow')
    const [entry] = await rowsOf(
      `select actor_kind, actor_id from audit_entries where actor_id = '${key.id}'`,
    )
    expect(entry).toEqual({ actor_kind: 'key', actor_id: key.id })
    const refused = await test
      .withKey(key.key)
      .post(`${system.url}/pairs`)
      .send({ foreground: 'ink', background: 'paper', use: 'text' })
      .expect(403)
    expect(refused.body.type).toBe('/problems/scope-missing')
  })

  it('logs each edit in the audit chain of the system', async () => {
    const { revision } = await system.editToken('ink', { value: '#010101' })
    const [entry] = await rowsOf(
      `select e.action, e.details from audit_entries e join systems s on s.id = e.chain_id
        where s.\`key\` = '${system.url.split('/').at(-1)}' order by e.seq desc limit 1`,
    )
    expect(entry).toMatchObject({ action: 'token.edited', details: JSON.stringify({ revision }) })
  })
})
