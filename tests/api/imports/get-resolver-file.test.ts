import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const BESIDES = {
  $description: 'Everything of the line',
  space: { $type: 'dimension', small: { $value: { value: 4, unit: 'px' } } },
  brand: {
    $extensions: { 'com.example.tool': { folder: 7 } },
    sea: {
      $type: 'color',
      $value: { colorSpace: 'hsl', components: ['none', 0, 40] },
      $extensions: { 'com.example.tool': { layer: 3 } },
      'x-note': 'by hand',
    },
    deep: { $type: 'color', $value: '{brand.sea}', $description: 'Under it' },
  },
}

/** Two themes, states, rules, overrides, a derived token, a pair, a distinct set, and what is no colour. */
async function createWholeSystem(): Promise<SampleSystem> {
  const system = await createSampleSystem(test)
  const { maintainer, url } = system
  await system.addToken('action.fill', 'oklch(0.5 0.12 250)', {
    states: ['hover', 'active', 'disabled'],
    rules: { states: { hover: { lightness: 0.07, towards: 'ink' } } },
    values: { light: { active: '#101080' } },
  })
  await system.addToken('action.soft', { derive: '{action.fill}', lightness: 0.2, chroma: 0.5 })
  await system.addToken('action.label', '{paper}', { description: 'On the fill' })
  await system.addToken('old', '#444444', {
    locked: true,
    deprecated: { reason: 'Renamed', replacement: 'ink', sunset: '2027-01-31' },
  })
  await system.putTheme('dark', {
    name: 'Dark',
    ground: 'paper',
    ink: 'ink',
    rule: { kind: 'mirror', chroma: 0.9 },
    gating: false,
    values: {
      paper: { rest: '#0b1020' },
      ink: { rest: '#eef2ff' },
      'action.label': { hover: '{ink}' },
    },
  })
  await system.addPair({ foreground: 'action.label', background: 'action.fill', use: 'text' })
  await system.addPair({
    foreground: 'old',
    background: 'paper',
    use: 'large-text',
    relation: 'together',
    themes: ['light'],
    minimum: 3.5,
    product: 'kiosk',
  })
  const { headers } = await maintainer.get(`${url}/rules`).expect(200)
  await maintainer
    .put(`${url}/rules`)
    .set('If-Match', String(headers.etag))
    .send({
      states: { hover: { lightness: 0.06 } },
      prefixes: [{ prefix: 'action', themes: { dark: { kind: 'relative', k: 0.9 } } }],
    })
    .expect(200)
  await maintainer.post(`${url}/imports`).send(BESIDES).expect(200)
  return system
}

const fileOf = async ({ maintainer, url }: SampleSystem) =>
  JSON.parse((await maintainer.get(`${url}/resolver.json`).expect(200)).text)

const replaceBy = async (url: string, document: object, query = '') =>
  (await test.people.admin.post(`${url}/imports?mode=replace${query}`).send(document).expect(200))
    .body

describe('the file of a system', () => {
  it('answers a resolver file that is sound, with a validator', async () => {
    const { maintainer, url } = await createWholeSystem()
    const { headers, text } = await maintainer.get(`${url}/resolver.json`).expect(200)
    expect(headers['content-type']).toContain('application/json')
    await maintainer
      .get(`${url}/resolver.json`)
      .set('If-None-Match', String(headers.etag))
      .expect(304)
    const reading = readDtcgResolver(JSON.parse(text))
    if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
    expect(reading.resolver.modifiers.map(({ name }) => name)).toEqual(['theme', 'state'])
    for (const { document } of reading.resolver.permutations()) {
      expect(readDtcgTokens(document).faults).toEqual([])
    }
  })

  it('leaves the system as it is where it is read in again, merged or replacing', async () => {
    const system = await createWholeSystem()
    const file = await fileOf(system)
    for (const mode of ['merge', 'replace']) {
      const { body } = await system.maintainer
        .post(`${system.url}/imports?mode=${mode}`)
        .send(file)
        .expect(200)
      expect(body).toMatchObject({ written: false, changes: [], notes: [] })
      expect(body.counts.derivedAgain).toBeGreaterThan(0)
    }
  })

  it('answers the same file from another system that took it', async () => {
    const file = await fileOf(await createWholeSystem())
    await test.createSystem('twin')
    const url = '/v1/systems/twin'
    const { written } = await replaceBy(url, file)
    expect(written).toBe(true)
    const twin = JSON.parse((await test.people.admin.get(`${url}/resolver.json`)).text)
    expect(withoutIds(twin)).toEqual(withoutIds(file))
  })

  it('answers what is no colour, and what it does not know, verbatim', async () => {
    const file = await fileOf(await createWholeSystem())
    const [core] = file.sets.core.sources
    expect(core.$description).toBe(BESIDES.$description)
    expect(core.space).toEqual(BESIDES.space)
    expect(core.brand.$extensions).toEqual(BESIDES.brand.$extensions)
    const { sea } = core.brand
    expect(sea.$value).toEqual(BESIDES.brand.sea.$value)
    expect(sea['x-note']).toBe('by hand')
    expect(sea.$extensions).toMatchObject(BESIDES.brand.sea.$extensions)
  })

  it('leaves out a spelling that the colour has outlived', async () => {
    const system = await createWholeSystem()
    await system.editToken('brand.sea', { value: '#00ffff' })
    const [core] = (await fileOf(system)).sets.core.sources
    expect(core.brand.sea.$value).toMatchObject({ colorSpace: 'oklch' })
    expect(core.brand.sea['x-note']).toBe('by hand')
  })

  it('answers a system without themes too', async () => {
    await test.createSystem('bare')
    const url = '/v1/systems/bare'
    const { maintainer } = test.people
    for (const [name, value] of [
      ['a', '#123456'],
      ['b', '{a}'],
      ['c', { derive: '{a}', lightness: 0.1 }],
    ]) {
      await maintainer.post(`${url}/tokens`).send({ name, value }).expect(201)
    }
    const file = JSON.parse((await maintainer.get(`${url}/resolver.json`).expect(200)).text)
    expect(await replaceBy(url, file)).toMatchObject({ written: false, changes: [] })
  })
})

describe('a derived colour changed in the file', () => {
  it('answers an override, and lists it', async () => {
    const system = await createWholeSystem()
    const file = await fileOf(system)
    const dark = file.modifiers.theme.contexts.dark[0]
    const value = { colorSpace: 'srgb', components: [1, 0, 0], alpha: 1 }
    dark.action.fill.$value = value
    dark['state-hover'].action.fill.$value = '{ink}'
    file.sets.core.sources[0].action.soft.$value = value
    const { body } = await system.maintainer.post(`${system.url}/imports`).send(file).expect(200)
    expect(body.notes.map(({ kind, pointer }: Record<string, string>) => [kind, pointer])).toEqual([
      ['overridden', '/sets/core/sources/0/action/soft'],
      ['overridden', '/modifiers/theme/contexts/dark/0/action/fill'],
      ['overridden', '/modifiers/theme/contexts/dark/0/state-hover/action/fill'],
    ])
    const { body: fill } = await system.maintainer.get(`${system.url}/tokens/action.fill`)
    expect(fill.values.dark.hover).toBe('{ink}')
    expect(fill.resolved.dark.rest.hex).toBe('#ff0000')
    const { body: soft } = await system.maintainer.get(`${system.url}/tokens/action.soft`)
    expect(soft.value).toMatchObject({ colorSpace: 'oklch' })
  })

  it('refuses a bad one with its pointer, and leaves all as it was', async () => {
    const system = await createWholeSystem()
    const file = await fileOf(system)
    const dark = file.modifiers.theme.contexts.dark[0]
    dark.action.fill.$value = { colorSpace: 'srgb', components: [2, 0, 0] }
    file.sets.core.sources[0].action.soft.$value = 'red'
    const { body } = await system.maintainer.post(`${system.url}/imports`).send(file).expect(422)
    const pointers = body.errors.map(({ pointer }: { pointer: string }) => pointer)
    expect(pointers).toContain('/sets/core/sources/0/action/soft/$value')
    expect(pointers).toContain('/modifiers/theme/contexts/dark/0/action/fill/$value/components/0')
  })
})

/** Ids are a system's own. */
const withoutIds = (file: object): unknown =>
  JSON.parse(JSON.stringify(file, (name, value) => (name === 'id' ? undefined : value)))
