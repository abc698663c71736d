import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { compose, type Service } from '#api/compose.ts'
import { stateDigest } from '#api/features/revisions/state-digest.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { createTestApp, type TestApp, testConfig } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

/** A second process of the service, which keeps a head of its own and follows what the first writes. */
let test: TestApp
let system: SampleSystem
let follower: Service
let systemId: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  follower = compose({ config: testConfig(test.database.serveUrl) })
  systemId = (await system.maintainer.get(system.url)).body.id
})
afterAll(async () => {
  await follower.close()
  await test.close()
})

/** A process that was just started reads the head whole. */
async function freshHead() {
  const fresh = compose({ config: testConfig(test.database.serveUrl) })
  try {
    return await fresh.services.heads.current(systemId)
  } finally {
    await fresh.close()
  }
}

async function expectFollowed() {
  const [followed, fresh] = [await follower.services.heads.current(systemId), await freshHead()]
  expect(followed.revision).toBe(fresh.revision)
  expect(followed.model).toEqual(fresh.model)
  expect(followed.tally).toEqual(fresh.tally)
  expect(verdictOf(followed.evaluation)).toEqual(verdictOf(fresh.evaluation))
  const { body } = await system.maintainer.get(`${system.url}/revisions/${followed.revision}`)
  expect(body.digest).toBe(stateDigest(followed.model))
  expect(body.counts).toEqual(fresh.tally.counts)
}

const dark = {
  name: 'Dark',
  ground: 'paper',
  ink: 'ink',
  rule: { kind: 'mirror' },
  values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
}
const declared: string[] = []
const declare = async (pair: object) => {
  declared.push(await system.addPair({ use: 'text', ...pair }))
}

async function putRules(rules: object) {
  const { headers } = await system.maintainer.get(`${system.url}/rules`)
  const put = system.maintainer.put(`${system.url}/rules`).set('If-Match', String(headers.etag))
  await put.send(rules).expect(200)
}

const STEPS: readonly (readonly [what: string, steps: () => Promise<unknown>])[] = [
  ['a token added', () => system.addToken('zeta', '#777777', { states: ['hover'] })],
  ['a token that sorts before it, by name', () => system.addToken('alpha', '{zeta}')],
  ['a pair declared', () => declare({ foreground: 'alpha', background: 'paper' })],
  ['a token edited', () => system.editToken('zeta', { value: '#555555' })],
  [
    'a token edited twice',
    async () => {
      await system.editToken('zeta', { value: '#787878' })
      await system.editToken('zeta', { value: '#797979', description: 'Twice' })
    },
  ],
  ['a token renamed', () => system.editToken('alpha', { name: 'omega' })],
  ['a theme made', () => system.putTheme('dark', dark)],
  ['a theme edited', () => system.patchTheme('dark', { rule: { kind: 'keep' }, gating: false })],
  [
    'rules replaced',
    () =>
      putRules({
        states: { hover: { lightness: 0.2 } },
        prefixes: [{ prefix: 'zeta' }, { prefix: 'omega' }],
      }),
  ],
  [
    'prefixes in another order',
    () =>
      putRules({
        states: { hover: { lightness: 0.2 } },
        prefixes: [{ prefix: 'omega' }, { prefix: 'zeta' }],
      }),
  ],
  ['settings edited', () => system.patchSettings({ level: 'AAA', disabledFloor: 2 })],
  ['a pair edited', () => system.editPair(String(declared[0]), { use: 'large-text', minimum: 6 })],
  [
    'a token that came and went',
    async () => {
      await system.addToken('brief', '#000000')
      await system.removeToken('brief')
    },
  ],
  [
    'a pair removed and declared anew',
    async () => {
      await system.removePair(String(declared[0]))
      await declare({ foreground: 'omega', background: 'paper' })
    },
  ],
  ['a theme removed', () => system.removeTheme('dark')],
  [
    'everything undone',
    async () => {
      await system.removePair(String(declared[1]))
      await system.removeToken('omega')
      await system.removeToken('zeta')
      await putRules({ states: {}, prefixes: [] })
    },
  ],
]

describe('a head that another process has moved', () => {
  it.each(STEPS)('answers as a fresh one does: %s', async (_, step) => {
    await step()
    await expectFollowed()
  })
})
