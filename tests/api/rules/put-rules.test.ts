import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('action.fill', 'oklch(0.6 0.1 250)', { states: ['hover'] })
  await system.addToken('actions.fill', 'oklch(0.6 0.1 250)', { states: ['hover'] })
})
afterAll(() => test.close())

const url = () => `${system.url}/rules`
const put = async (body: object, agent = system.maintainer) => {
  const { headers } = await system.maintainer.get(url()).expect(200)
  return agent.put(url()).set('If-Match', String(headers.etag)).send(body)
}
const hoverOf = async (name: string) => {
  const { body } = await system.maintainer.get(`${system.url}/tokens/${name}`)
  return body.resolved.light.hover.oklch.components[0]
}

describe('putRules', () => {
  it('answers the rules as given, and moves what they cover by whole name segments', async () => {
    const rules = {
      states: { hover: { lightness: 0.04, towards: 'ink' } },
      prefixes: [{ prefix: 'action', states: { hover: { lightness: 0.1 } } }],
    }
    const { status, body } = await put({ ...rules, message: 'Stronger hover' })
    expect(status).toBe(200)
    expect(body).toMatchObject(rules)
    expect(await hoverOf('action.fill')).toBeCloseTo(0.5, 12)
    expect(await hoverOf('actions.fill')).toBeCloseTo(0.56, 12)
    const { body: read } = await system.maintainer.get(url())
    const { effect: _, ...answered } = body
    expect(read).toEqual(answered)
    const { body: revision } = await system.maintainer.get(
      `${system.url}/revisions/${body.effect.revision}`,
    )
    expect(revision).toMatchObject({ ...rules, message: 'Stronger hover' })
  })

  it('answers rules that name tokens and themes, in the order given', async () => {
    const rules = {
      states: { hover: { lightness: 0.05, away: '{paper}' } },
      prefixes: [
        { prefix: 'b', themes: { light: { kind: 'match-contrast', against: '{ink}' } } },
        { prefix: 'a' },
      ],
    }
    expect((await put(rules)).body).toMatchObject(rules)
  })

  it('refuses every fault at once, each with its pointer', async () => {
    const { status, body } = await put({
      states: { hover: { away: '{none}' } },
      prefixes: [
        { prefix: 'a', themes: { dusk: { kind: 'keep' } } },
        { prefix: 'a' },
        { prefix: 'a..b' },
      ],
    })
    expect(status).toBe(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/prefixes/0/themes/dusk',
      '/prefixes/1/prefix',
      '/prefixes/2/prefix',
      '/states/hover/away',
    ])
  })

  it('refuses the lead and the engineer, and an edit without or with a stale If-Match', async () => {
    const rules = { states: {}, prefixes: [] }
    expect((await put(rules, test.people.lead)).status).toBe(403)
    expect((await put(rules, test.people.engineer)).status).toBe(403)
    await system.maintainer.put(url()).send(rules).expect(428)
    await system.maintainer.put(url()).set('If-Match', '"old"').send(rules).expect(412)
  })
})
