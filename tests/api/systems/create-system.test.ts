import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const post = (body: object, agent = test.people.admin) => agent.post('/v1/systems').send(body)

describe('createSystem', () => {
  it('answers an empty system at revision 0', async () => {
    const { body } = await post({ key: 'harbour', name: 'Harbour', level: 'AAA' }).expect(201)
    expect(body).toMatchObject({
      key: 'harbour',
      name: 'Harbour',
      writeMode: 'direct',
      level: 'AAA',
      p3: true,
      p3Gates: true,
      disabledFloor: null,
      counts: { tokens: 0, pairs: 0, themes: 0, openBreaches: 0 },
      head: { revision: 0, verdict: 'pass', author: { name: 'Odd Brekke' } },
      latestRelease: null,
    })
    const { body: revision } = await test.people.admin.get('/v1/systems/harbour/revisions/0')
    expect(revision).toMatchObject({ origin: 'created', tokens: [], settings: { level: 'AAA' } })
  })

  it('refuses a key that is taken, and leaves nothing of the second', async () => {
    await post({ key: 'twice', name: 'First' }).expect(201)
    const { body } = await post({ key: 'twice', name: 'Second' }).expect(409)
    expect(body.type).toBe('/problems/system-key-taken')
    const { body: read } = await test.people.admin.get('/v1/systems/twice').expect(200)
    expect(read.name).toBe('First')
  })

  it.each(['Upper', 'a.b', '-a', 'a--b', '', 'x'.repeat(64)])('refuses the key %j', async (key) => {
    const { body } = await post({ key, name: 'X' }).expect(422)
    expect(body.errors[0].pointer).toBe('/key')
  })

  it('refuses everyone but an administrator', async () => {
    const { body } = await post({ key: 'mine', name: 'Mine' }, test.people.maintainer).expect(403)
    expect(body.detail).toContain('admin')
  })
})
