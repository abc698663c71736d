import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let set: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('red', '#ff0000')
  await system.addToken('green', '#00ff00')
  await system.addToken('twin', '#00ff00')
  await system.putTheme('dark', {
    name: 'Dark',
    ground: 'paper',
    ink: 'ink',
    rule: { kind: 'keep' },
    values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' }, red: { rest: '#00fe00' } },
  })
  const made = await system.maintainer
    .post(`${system.url}/distinct-sets`)
    .send({ name: 'Series', tokens: ['red', 'green'] })
    .expect(201)
  set = made.body.id
})
afterAll(() => test.close())

const inTheme = ({ distinctSets }: CheckWire, theme: string) =>
  distinctSets.find((one) => one.theme === theme)

describe('createCheck, of distinct sets', () => {
  it('answers the closest couple in each theme, as it is and as it is simulated', async () => {
    const check = await system.check()
    expect(check.distinctSets.map(({ id, name, theme }) => [id, name, theme])).toEqual([
      [set, 'Series', 'light'],
      [set, 'Series', 'dark'],
    ])
    // 86.608 between pure red and pure green: common practice, no source.
    expect(inTheme(check, 'light')?.plain.deltaE2000).toBeCloseTo(86.608, 2)
    expect(inTheme(check, 'light')?.plain).toMatchObject({ first: 'red', second: 'green' })
    const { protan, deutan, plain } = inTheme(check, 'light') ?? {}
    expect(protan?.deltaE2000).toBeLessThan(plain?.deltaE2000 ?? 0)
    expect(deutan?.deltaE2000).toBeLessThan(plain?.deltaE2000 ?? 0)
    expect(inTheme(check, 'dark')?.plain.deltaE2000).toBeLessThan(1)
    const { body } = await system.maintainer.get(`${system.url}/checks/${check.id}`).expect(200)
    expect(body.distinctSets).toEqual(check.distinctSets)
  })

  it('leaves the verdict alone, however close they are', async () => {
    const check = await system.check({ tokens: { red: dtcgHex('#00ff00') } })
    expect(inTheme(check, 'light')?.plain.deltaE2000).toBe(0)
    expect(check).toMatchObject({ verdict: 'pass', findings: [] })
  })

  it('answers for what is left where a candidate lacks a member', async () => {
    const { headers } = await system.maintainer.get(`${system.url}/distinct-sets/${set}`)
    const patch = system.maintainer.patch(`${system.url}/distinct-sets/${set}`)
    await patch
      .set('If-Match', String(headers.etag))
      .send({ tokens: ['red', 'green', 'twin'] })
      .expect(200)
    const base = { paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000') }
    const lacking = await system.check({
      mode: 'replace',
      tokens: { ...base, green: dtcgHex('#00ff00'), twin: dtcgHex('#00ff00') },
    })
    expect(inTheme(lacking, 'light')?.plain).toEqual({
      first: 'green',
      second: 'twin',
      deltaE2000: 0,
    })
    const alone = await system.check({
      mode: 'replace',
      tokens: { ...base, green: dtcgHex('#00ff00') },
    })
    expect(alone.distinctSets).toEqual([])
  })
})
