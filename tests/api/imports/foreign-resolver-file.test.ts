import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { dtcgHex } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

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
    const { body: again } = await test.people.admin
      .post(`${url}/imports?mode=replace`)
      .send(file)
      .expect(200)
    expect(again).toMatchObject({ written: false, changes: [] })
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

  it('answers what is no colour as in the base, and tells of a context that says otherwise', async () => {
    await test.createSystem('spaced')
    const url = '/v1/systems/spaced'
    const space = (value: number) => ({ $type: 'number', $value: value })
    const [paper] = FOREIGN.sets.base.sources
    const sets = { base: { sources: [{ ...paper, space: space(1) }] } }
    const [night] = FOREIGN.modifiers.mood.contexts.night
    const contexts = {
      night: [{ ...night, space: space(2) }],
      day: [],
      noon: [{ space: space(1) }],
    }
    const modifiers = { mood: { default: 'day', contexts } }
    const { notes } = await take(url, { ...FOREIGN, sets, modifiers })
    expect(notes).toMatchObject([{ kind: 'left-out', pointer: '/modifiers/mood/contexts/night' }])
    expect((await give(url)).sets.core.sources[0].space).toEqual(space(1))
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
