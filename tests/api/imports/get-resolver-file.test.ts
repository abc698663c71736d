import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

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

describe('what a resolver file of another making says of itself', () => {
  const FOREIGN = {
    $schema: 'https://example.org/resolver.json',
    name: 'Quay',
    description: 'Everything at the quay',
    version: '2025.10',
    $defs: { shared: [{ any: 'thing' }] },
    sets: {
      base: {
        description: 'By day',
        sources: [{ paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000') }],
        $extensions: { 'org.example': { set: 1 } },
      },
    },
    modifiers: {
      mood: {
        description: 'Day or night',
        default: 'day',
        contexts: { night: [{ paper: dtcgHex('#000011'), ink: dtcgHex('#eeeeff') }], day: [] },
        $extensions: { 'org.example': { modifier: 2 } },
      },
    },
    resolutionOrder: [
      { $ref: '#/sets/base' },
      { $ref: '#/modifiers/mood', description: 'When it is read' },
    ],
    $extensions: { 'org.example': { owner: null }, 'com.example.tool': [1] },
    'x-unknown': { kept: [true] },
  }
  const OWN = ['version', 'sets', 'modifiers', 'resolutionOrder', '$extensions']
  const besides = (file: object) =>
    Object.fromEntries(Object.entries(file).filter(([member]) => !OWN.includes(member)))
  const take = async (url: string, file: object) =>
    (await test.people.maintainer.post(`${url}/imports?ground=paper&ink=ink`).send(file)).body
  const give = async (url: string) =>
    JSON.parse((await test.people.maintainer.get(`${url}/resolver.json`).expect(200)).text)

  it('answers its members verbatim, and those of the set and modifier that it became', async () => {
    await test.createSystem('said')
    const url = '/v1/systems/said'
    expect(await take(url, FOREIGN)).toMatchObject({ written: true, notes: [] })
    const file = await give(url)
    expect(besides(file)).toEqual(besides(FOREIGN))
    expect(file.$extensions).toMatchObject(FOREIGN.$extensions)
    expect(file.sets.core).toMatchObject({
      description: 'By day',
      $extensions: { 'org.example': { set: 1 } },
    })
    expect(file.modifiers.theme).toMatchObject({
      description: 'When it is read',
      $extensions: FOREIGN.modifiers.mood.$extensions,
    })
    expect(Object.keys(file.modifiers.theme.contexts)).toEqual(['day', 'night'])
    expect(readDtcgResolver(file).ok).toBe(true)
    expect(await replaceBy(url, file)).toMatchObject({ written: false, changes: [] })
    expect(await take(url, FOREIGN)).toMatchObject({ written: false, changes: [] })
  })

  it('leaves what a newer file does not say, and answers what it says anew', async () => {
    await test.createSystem('renewed')
    const url = '/v1/systems/renewed'
    await take(url, FOREIGN)
    const { description: _, $defs: __, ...newer } = FOREIGN
    const $extensions = { 'org.example': 'new' }
    const { changes } = await take(url, { ...newer, name: 'Pier', $extensions })
    expect(changes.map(({ item }: { item: string }) => item)).toEqual(['other'])
    const file = await give(url)
    expect(besides(file)).toEqual({ ...besides(FOREIGN), name: 'Pier' })
    expect(file.$extensions).toMatchObject({ ...FOREIGN.$extensions, ...$extensions })
  })

  it('leaves out what is said of one set among several, and tells so', async () => {
    await test.createSystem('several')
    const url = '/v1/systems/several'
    const sets = { ...FOREIGN.sets, more: { sources: [{ sea: dtcgHex('#003355') }] } }
    const resolutionOrder = [...FOREIGN.resolutionOrder, { $ref: '#/sets/more' }]
    const { notes } = await take(url, { ...FOREIGN, sets, resolutionOrder })
    expect(notes).toMatchObject([{ kind: 'left-out', pointer: '/resolutionOrder/0' }])
    expect((await give(url)).sets.core).not.toHaveProperty('description')
  })

  it('refuses words that are none, each with its place', async () => {
    await test.createSystem('worded')
    const { errors } = await take('/v1/systems/worded', {
      ...FOREIGN,
      name: 1,
      description: ['x'],
      $extensions: 5,
      sets: { base: { ...FOREIGN.sets.base, description: null } },
      modifiers: { mood: { ...FOREIGN.modifiers.mood, $extensions: [] } },
    })
    expect(errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/$extensions',
      '/description',
      '/modifiers/mood/$extensions',
      '/name',
      '/sets/base/description',
    ])
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
