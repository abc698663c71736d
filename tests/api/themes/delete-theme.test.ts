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
  const values = { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } }
  const dark = { name: 'Dark', ground: 'paper', ink: 'ink', values }
  await system.putTheme('dark', dark)
  await system.putTheme('night', { ...dark, from: 'dark' })
})
afterAll(() => test.close())

async function remove(key: string, agent = system.maintainer) {
  const url = `${system.url}/themes/${key}`
  const { body } = await system.maintainer.get(url).expect(200)
  return agent.delete(url).set('If-Match', body.etag)
}

describe('deleteTheme', () => {
  it('leaves nothing of it on tokens, rules and pairs, and its breach resolved', async () => {
    await system.addToken('note', '#555555', {
      values: { night: { hover: '#000000' } },
      rules: { themes: { night: { kind: 'keep' } } },
    })
    const pair = await system.addPair({
      foreground: 'note',
      background: 'paper',
      use: 'text',
      themes: ['light', 'night'],
    })
    expect((await system.breaches()).map(({ theme }) => theme)).toEqual(['night'])
    expect((await remove('night', test.people.admin)).status).toBe(204)
    const { body: token } = await system.maintainer.get(`${system.url}/tokens/note`)
    expect(token.values).toEqual({})
    expect(token.rules).toEqual({ themes: {} })
    expect(Object.keys(token.resolved)).toEqual(['light', 'dark'])
    const { body: declared } = await system.maintainer.get(`${system.url}/pairs/${pair}`)
    expect(declared.themes).toEqual(['light'])
    expect(await system.breaches('?status=resolved')).toMatchObject([
      { theme: 'night', closingReason: 'theme-removed' },
    ])
  })

  it('refuses a theme that others derive from, and one that a pair occurs in alone', async () => {
    const parent = await remove('dark')
    expect([parent.status, parent.body.type]).toEqual([409, '/problems/theme-in-use'])
    expect(parent.body.detail).toContain('night')
    expect((await remove('light')).body.detail).toContain('dark, night')
    await system.addPair({
      foreground: 'ink',
      background: 'paper',
      use: 'text',
      themes: ['night'],
    })
    expect((await remove('night')).status).toBe(409)
  })

  it('refuses while a locked token has an override or a rule in it, as setting one would', async () => {
    await system.addToken('mark', '#555555', {
      values: { night: { rest: '#777777' } },
      locked: true,
    })
    await system.addToken('note', '#555555', {
      rules: { themes: { night: { kind: 'keep' } } },
      locked: true,
    })
    const refused = await remove('night')
    expect([refused.status, refused.body.type]).toEqual([409, '/problems/token-locked'])
    expect(refused.body.detail).toBe('Locked: mark, note')
    await system.editToken('mark', { locked: false })
    await system.editToken('note', { locked: false })
    expect((await remove('night')).status).toBe(204)
  })

  it('refuses the lead, and a missing or stale If-Match', async () => {
    expect((await remove('night', test.people.lead)).status).toBe(403)
    const url = `${system.url}/themes/night`
    await system.maintainer.delete(url).expect(428)
    await system.maintainer.delete(url).set('If-Match', '"old"').expect(412)
  })
})
