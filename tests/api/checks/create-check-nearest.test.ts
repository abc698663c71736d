import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CheckFindingWire, CheckWire } from '#shared/contracts/checks.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('quay', '#333333')
  await system.addToken('rope', '{quay}')
  for (const foreground of ['quay', 'rope']) {
    await system.addPair({ foreground, background: 'paper', use: 'text' })
  }
})
afterAll(() => test.close())

const check = async (body: object, query = '?nearest=true'): Promise<CheckWire> =>
  (await test.people.engineer.post(`${system.url}/checks${query}`).send(body).expect(200)).body
const breachesOf = ({ findings }: CheckWire): CheckFindingWire[] =>
  findings.filter(({ outcome }) => outcome === 'breach')
const grey = { tokens: { quay: dtcgHex('#999999') } }

describe('nearest=true', () => {
  it('answers each breach the nearest colour, with which the same candidate passes', async () => {
    const failed = await check(grey)
    const breaches = breachesOf(failed)
    expect(breaches.map(({ foreground }) => foreground)).toEqual(['quay', 'rope'])
    // The lightest grey that has 4.5:1 on white is #767676: 4.54.
    for (const { nearest } of breaches) {
      expect(nearest).toMatchObject({ token: 'quay', theme: 'light', state: 'rest' })
      expect(nearest).toMatchObject({ source: true, hex: '#767676' })
    }
    const color = breaches[0]?.nearest?.color
    const mended = await check({ tokens: { quay: { $type: 'color', $value: color } } })
    expect(mended.verdict).toBe('pass')
  })

  it('answers a color of few decimals, which passes as it is copied', async () => {
    const sent = { tokens: { quay: { $type: 'color', $value: oklch(0.8, 0.1, 240) } } }
    const [breach] = breachesOf(await check(sent))
    const color = breach?.nearest?.color
    expect(String(color?.components[0]).length).toBeLessThan(9)
    const mended = await check({ tokens: { quay: { $type: 'color', $value: color } } })
    expect(mended.verdict).toBe('pass')
  })

  it('answers the same when the check is read again, and in SARIF', async () => {
    const made = await check(grey)
    const address = `${system.url}/checks/${made.id}`
    expect((await test.people.engineer.get(address).expect(200)).body).toEqual(made)
    const { text } = await test.people.engineer
      .get(address)
      .set('Accept', 'application/sarif+json')
      .buffer(true)
      .expect(200)
    const [result] = JSON.parse(text).runs[0].results
    expect(result.message.text).toMatch(/The nearest that passes: oklch\(.+\) #767676 for quay\./)
    expect(result.properties.nearest.hex).toBe('#767676')
  })

  it('leaves it out unless it is asked for, and where the check passes', async () => {
    const plain = await check(grey, '')
    expect(breachesOf(plain)[0]).not.toHaveProperty('nearest')
    expect(breachesOf(plain)[0]).not.toHaveProperty('unmended')
    expect((await check({})).verdict).toBe('pass')
  })

  it('answers the token that was sent before any other', async () => {
    const sent = { tokens: { plank: dtcgHex('#777777') } }
    await system.addToken('plank', '#ffffff')
    await system.addPair({ foreground: 'quay', background: 'plank', use: 'text' })
    const [breach] = breachesOf(await check(sent))
    expect(breach?.nearest?.token).toBe('plank')
  })

  it('answers why there is none', async () => {
    await system.addToken('held', '#ffffff', { locked: true })
    await system.addToken('mast', '#ffffff', { locked: true })
    const pairs = [{ foreground: 'held', background: 'mast', use: 'text' }]
    const [breach] = breachesOf(await check({ pairs }))
    expect(breach).toMatchObject({ unmended: { reason: 'locked' } })
    expect(breach).not.toHaveProperty('nearest')
  })

  it('leaves what is known as it is, with newOnly', async () => {
    await system.addToken('wake', '#aaaaaa')
    await system.addPair({ foreground: 'wake', background: 'paper', use: 'text' })
    const { findings } = await check({ ...grey, newOnly: true })
    const known = findings.filter(({ outcome }) => outcome === 'known')
    expect(known.map(({ foreground }) => foreground)).toEqual(['wake'])
    expect(known[0]).not.toHaveProperty('nearest')
    const [breach] = findings.filter(({ outcome }) => outcome === 'breach')
    expect(breach?.nearest).toMatchObject({ token: 'quay', hex: '#767676' })
  })

  it('answers the twenty furthest short, and of the others that they were not searched', async () => {
    const tokens: Record<string, object> = {}
    const pairs: object[] = []
    for (let at = 0; at < 22; at += 1) {
      const byte = (0xa0 + at).toString(16)
      tokens[`mark${at}`] = dtcgHex(`#${byte}${byte}${byte}`)
      pairs.push({ foreground: `mark${at}`, background: 'paper', use: 'text' })
    }
    const breaches = breachesOf(await check({ tokens, pairs, newOnly: true }))
    expect(breaches).toHaveLength(22)
    const searched = breaches.filter(({ nearest }) => nearest !== undefined)
    expect(searched).toHaveLength(20)
    const rest = breaches.filter(({ nearest }) => nearest === undefined)
    expect(rest.map(({ foreground }) => foreground)).toEqual(['mark0', 'mark1'])
    expect(rest[0]?.unmended).toEqual({ reason: 'budget' })
  })
})

const oklch = (...components: number[]) => ({ colorSpace: 'oklch', components, alpha: 1 })
