import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const at = (name: string) => `${system.url}/tokens/${encodeURIComponent(name)}`
async function remove(name: string) {
  const { body } = await system.maintainer.get(at(name)).expect(200)
  return system.maintainer.delete(`${at(name)}?message=Unused`).set('If-Match', body.etag)
}

describe('deleteToken', () => {
  it('leaves the token in the revisions before it, and its name free', async () => {
    await system.addToken('spare', '#123456')
    expect((await remove('spare')).status).toBe(204)
    await system.maintainer.get(at('spare')).expect(404)
    const { body } = await system.maintainer.get(`${system.url}/revisions`).expect(200)
    const [last, before] = body.items
    expect(last.message).toBe('Unused')
    const { body: earlier } = await system.maintainer.get(
      `${system.url}/revisions/${before.number}`,
    )
    expect(earlier.tokens.map(({ name }: { name: string }) => name)).toContain('spare')
    await system.addToken('spare', '#654321')
  })

  it('refuses a token that is used, and names who uses it', async () => {
    await system.addToken('base', '#333333')
    await system.addToken('other', '#ffffff')
    await system.addToken('alias', '{base}')
    await system.addToken('derived', { derive: '{base}', lightness: 0.1 })
    await system.addToken('ruled', '#444444', {
      rules: { states: { hover: { lightness: 0.1, away: '{base}' } } },
    })
    await system.addToken('outgoing', '#555555', { deprecated: { replacement: 'base' } })
    await system.addPair({ foreground: 'base', background: 'other', use: 'text' })
    await system.addPair({
      foreground: 'ink',
      background: 'other',
      use: 'text',
      backdrop: ['base'],
    })
    const { status, body } = await remove('base')
    expect([status, body.type]).toEqual([409, '/problems/token-in-use'])
    for (const user of ['base on other', 'ink on other', 'alias', 'derived', 'ruled', 'outgoing']) {
      expect(body.detail).toContain(user)
    }
    const ground = await remove('paper')
    expect(ground.body.detail).toBe('paper is used as ground of theme light')
    await system.addToken('old', '#666666', { deprecated: { replacement: 'other' } })
    expect((await remove('other')).body.detail).toBe(
      'other is used by pairs: base on other, ink on other; as replacement of old',
    )
  })

  it('refuses a locked token, a missing and a stale If-Match', async () => {
    await system.addToken('kept', '#123456', { locked: true })
    expect((await remove('kept')).body.type).toBe('/problems/token-locked')
    await system.maintainer.delete(at('kept')).expect(428)
    await system.maintainer.delete(at('kept')).set('If-Match', '"stale"').expect(412)
  })
})
