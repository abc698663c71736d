import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import type { Effect } from '#api/features/revisions/write-effect.ts'
import type { TestApp } from './app.ts'
import type { Agent } from './people.ts'

/** A system of one theme, ink on paper, that a test builds further on. */
export interface SampleSystem {
  /** Address of the system, `/v1/systems/…`. */
  readonly url: string
  readonly maintainer: Agent
  addToken(name: string, value: unknown, members?: object): Promise<void>
  /** Sets a token's members; answers what it did to the head. */
  editToken(name: string, members: object): Promise<Effect>
  removeToken(name: string): Promise<void>
  /** Answers the pair's id. */
  addPair(pair: object): Promise<string>
  /** This and what follows may weaken, so the admin does it, who needs nobody's approval. */
  editPair(id: string, members: object, as?: Agent): Promise<void>
  removePair(id: string): Promise<void>
  putTheme(key: string, theme: object): Promise<void>
  patchTheme(key: string, members: object): Promise<void>
  removeTheme(key: string): Promise<void>
  patchSettings(members: object): Promise<void>
  breaches(query?: string): Promise<BreachWire[]>
  check(body?: object, query?: string): Promise<CheckWire>
}

let made = 0

/** The first theme is `light`: `ink` #000000 on `paper` #ffffff, level AA, without P3. */
export async function createSampleSystem(test: TestApp): Promise<SampleSystem> {
  made += 1
  const key = `sample-${made}`
  await test.createSystem(key)
  const system = systemAt(`/v1/systems/${key}`, test)
  await system.patchSettings({ p3: false, p3Gates: false })
  await system.addToken('paper', '#ffffff')
  await system.addToken('ink', '#000000')
  await system.putTheme('light', { name: 'Light', ground: 'paper', ink: 'ink' })
  return system
}

function systemAt(url: string, { people }: TestApp): SampleSystem {
  const { admin, maintainer } = people
  const etagAt = async (path: string) =>
    String((await maintainer.get(`${url}${path}`).expect(200)).headers.etag)
  const patch = async (path: string, members: object, as = maintainer) => {
    const etag = await etagAt(path)
    const { body } = await as.patch(`${url}${path}`).set('If-Match', etag).send(members).expect(200)
    return body.effect as Effect
  }
  const remove = async (path: string, as = maintainer) => {
    await as
      .delete(`${url}${path}`)
      .set('If-Match', await etagAt(path))
      .expect(204)
  }
  return {
    url,
    maintainer,
    async addToken(name, value, members = {}) {
      await maintainer
        .post(`${url}/tokens`)
        .send({ name, value, ...members })
        .expect(201)
    },
    editToken: (name, members) => patch(`/tokens/${encodeURIComponent(name)}`, members),
    removeToken: (name) => remove(`/tokens/${encodeURIComponent(name)}`),
    async addPair(pair) {
      const { body } = await maintainer.post(`${url}/pairs`).send(pair).expect(201)
      return body.id
    },
    async editPair(id, members, as = admin) {
      await patch(`/pairs/${id}`, members, as)
    },
    removePair: (id) => remove(`/pairs/${id}`, admin),
    async putTheme(key, theme) {
      const put = maintainer.put(`${url}/themes/${key}`).set('If-None-Match', '*')
      await put.send(theme).expect(201)
    },
    async patchTheme(key, members) {
      await patch(`/themes/${key}`, members, admin)
    },
    removeTheme: (key) => remove(`/themes/${key}`, admin),
    async patchSettings(members) {
      await patch('', members, admin)
    },
    async breaches(query = '') {
      const { body } = await maintainer.get(`${url}/breaches${query}`).expect(200)
      return body.items
    },
    async check(body = {}, query = '') {
      return (await maintainer.post(`${url}/checks${query}`).send(body).expect(200)).body
    },
  }
}

/** A color token of a DTCG document, from six hexadecimal digits. */
export function dtcgHex(hex: string, alpha = 1) {
  const components = (hex.match(/[0-9a-f]{2}/gi) ?? []).map(
    (byte) => Number.parseInt(byte, 16) / 255,
  )
  return { $type: 'color', $value: { colorSpace: 'srgb', components, alpha } } as const
}
