import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const asIs = (body: string) => body
const post = (body: string | Buffer, query = '') =>
  system.maintainer
    .post(`${system.url}/imports${query}`)
    .set('Content-Type', 'application/json')
    .serialize(asIs)
    .send(body)

const color = (components = '[0.5,0.5,0.5]') =>
  `{"$type":"color","$value":{"colorSpace":"srgb","components":${components}}}`
const aliasOf = (name: string) => `{"$type":"color","$value":"{${name}}"}`
const named = (entries: readonly [string, string][]) =>
  `{${entries.map(([name, token]) => `${JSON.stringify(name)}:${token}`).join(',')}}`
const headOf = async () => (await system.maintainer.get(system.url).expect(200)).body.head.revision

describe('unreadable', () => {
  it.each([
    ['a nesting of 33', `${'{"g":'.repeat(33)}{}${'}'.repeat(33)}`],
    ['a nesting of 500,000', `${'{"g":'.repeat(500_000)}{}${'}'.repeat(500_000)}`],
    ['more than a million members', `{"a":[${'0,'.repeat(1_000_000)}0]}`],
    ['broken JSON', '{"a":'],
    ['bytes that are not UTF-8', Buffer.from([0x7b, 0x22, 0xff, 0x22, 0x3a, 0x31, 0x7d])],
    ['UTF-16 with its mark', Buffer.from('\ufeff{}', 'utf16le')],
    ['half of a character', '{"\\ud83d":{}}'],
    ['nothing', ''],
  ])('refuses %s', async (_, body) => {
    const { body: problem } = await post(body).expect(400)
    expect(problem.type).toBe('/problems/request-unreadable')
  })
})

describe('read and refused, with a pointer', () => {
  const deep = Array.from({ length: 35 }, (_, at): [string, string] => [
    `c${at}`,
    at === 0 ? color() : aliasOf(`c${at - 1}`),
  ])

  it.each([
    ['a number beyond all numbers', named([['a', color('[1e999,0,0]')]]), '/a/$value/components/0'],
    [
      'a component beside its range',
      named([['a', color('[1e308,0,0]')]]),
      '/a/$value/components/0',
    ],
    ['NaN as text', named([['a', color('["NaN",0,0]')]]), '/a/$value/components/0'],
    ['a chain of 33 aliases', named(deep), '/c33'],
    ['an alias of itself', named([['a', aliasOf('a')]]), '/a/$value'],
    ['a token in a token', `{"a":${color().slice(0, -1)},"b":${color()}}}`, '/a/b'],
    ['a name with control characters', named([['a\u0007', color()]]), '/a\u0007'],
    ['a name of 256 letters', named([['n'.repeat(256), color()]]), `/${'n'.repeat(256)}`],
    ['a reserved group', `{"state-hover":{"a":${color()}}}`, '/state-hover/a'],
    ['a standing token as a group', `{"ink":{"soft":${color()}}}`, '/ink/soft'],
    ['a text for a colour', named([['a', '{"$type":"color","$value":"#fff"}']]), '/a/$value'],
    ['a list', '[]', ''],
    ['a text', '"x"', ''],
  ])('refuses %s', async (_, body, pointer) => {
    const before = await headOf()
    const { body: problem } = await post(body).expect(422)
    const pointers = problem.errors.map((fault: { pointer: string }) => fault.pointer)
    expect(pointers).toContain(pointer)
    expect(await headOf()).toBe(before)
  })

  it('refuses two names that are one after NFC, in the file and in the system', async () => {
    const [composed, apart] = ['caf\u00e9', 'cafe\u0301']
    const twice = named([
      [composed, color()],
      [apart, color()],
    ])
    const { body } = await post(twice).expect(422)
    expect(body.errors[0]).toMatchObject({ pointer: `/${apart}` })
    await post(named([[composed, color()]])).expect(200)
    const { body: again } = await post(named([[apart, color()]])).expect(422)
    expect(again.errors[0].detail).toContain('composed differently')
  })

  it('refuses 20,001 tokens before any of them is read, whatever their kind', async () => {
    const many = (token: string) =>
      named(Array.from({ length: 20_001 }, (_, at): [string, string] => [`t${at}`, token]))
    for (const token of [color(), '{"$type":"number","$value":1}']) {
      const { body } = await post(many(token)).expect(422)
      expect(body.errors).toEqual([
        { pointer: '', detail: 'A file has 20000 tokens at most', code: 'too-many-tokens' },
      ])
    }
  })

  it('refuses every bad token at once, and takes none of the good', async () => {
    const before = await headOf()
    const entries = Array.from({ length: 60 }, (_, at): [string, string] => [
      `t${at}`,
      at % 3 === 0 ? color('[2,0,0]') : color(),
    ])
    const { body } = await post(named(entries)).expect(422)
    const pointers = body.errors.map((fault: { pointer: string }) => fault.pointer)
    expect(pointers).toEqual(
      entries.flatMap(([name], at) => (at % 3 === 0 ? [`/${name}/$value/components/0`] : [])),
    )
    expect(await headOf()).toBe(before)
  })

  it('refuses names that lead to the prototype', async () => {
    await post(`{"__proto__":${color()}}`).expect(422)
    await post(`{"constructor":{"prototype":${color()}}}`).expect(200)
    expect(({} as { prototype?: unknown }).prototype).toBeUndefined()
  })
})

describe('before there is a theme', () => {
  const chain = (from: number, to: number): [string, string][] =>
    Array.from({ length: to - from + 1 }, (_, at): [string, string] => [
      `c${from + at}`,
      from + at === 0 ? color() : aliasOf(`c${from + at - 1}`),
    ])
  const send = (key: string, entries: readonly [string, string][], query = '') =>
    system.maintainer
      .post(`/v1/systems/${key}/imports${query}`)
      .set('Content-Type', 'application/json')
      .serialize(asIs)
      .send(named(entries))
  const pointersIn = (body: { errors: { pointer: string }[] }) =>
    body.errors.map(({ pointer }) => pointer)

  it('answers 32 aliases one after another, and refuses each token beyond by its place', async () => {
    await test.createSystem('unthemed')
    const { body } = await send('unthemed', chain(0, 34), '?dryRun=true').expect(422)
    expect(body.type).toBe('/problems/system-unresolvable')
    expect(pointersIn(body)).toEqual(['/c33', '/c34'])
    await send('unthemed', chain(0, 32)).expect(200)
    const { body: more } = await send('unthemed', chain(33, 33)).expect(422)
    expect(pointersIn(more)).toEqual(['/c33'])
  })

  it('refuses 2,000 of them', async () => {
    await test.createSystem('endless')
    const { body } = await send('endless', chain(0, 2_000), '?dryRun=true').expect(422)
    expect(pointersIn(body)).toContain('/c33')
    expect(body.more).toBeGreaterThan(1_800)
  })

  it('refuses a circle that the file closes over what stands', async () => {
    await test.createSystem('circle')
    await send('circle', [
      ['a', color()],
      ['b', aliasOf('a')],
    ]).expect(200)
    const { body } = await send('circle', [['a', aliasOf('b')]]).expect(422)
    expect(pointersIn(body)).toContain('/a')
  })
})

describe('resolver files', () => {
  const resolver = (members: object) =>
    post(JSON.stringify({ version: '2025.10', ...members }), '?dryRun=true')
  const contexts = (count: number) =>
    Object.fromEntries(Array.from({ length: count }, (_, at) => [`c${at}`, []]))
  const SPAN = { paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000') }

  it('refuses a document that lies elsewhere', async () => {
    const { body } = await resolver({
      sets: { core: { sources: [{ $ref: 'https://example.test/tokens.json' }] } },
      resolutionOrder: [{ $ref: '#/sets/core' }],
    }).expect(422)
    expect(body.errors[0].pointer).toBe('/sets/core/sources/0/$ref')
  })

  it('refuses more choices, and more themes, than a system can have', async () => {
    const wide = { a: { contexts: contexts(20) }, b: { contexts: contexts(20) } }
    await resolver({
      sets: {},
      modifiers: wide,
      resolutionOrder: [{ $ref: '#/modifiers/a' }, { $ref: '#/modifiers/b' }],
    }).expect(422)
    const { body } = await resolver({
      sets: { core: { sources: [SPAN] } },
      modifiers: { theme: { contexts: contexts(9) } },
      resolutionOrder: [{ $ref: '#/sets/core' }, { $ref: '#/modifiers/theme' }],
    }).expect(422)
    const details = body.errors.map((fault: { detail: string }) => fault.detail)
    expect(details).toContain('A system has at most 8 themes')
  })

  it('refuses sets that name each other in a circle', async () => {
    await resolver({
      sets: {
        a: { sources: [{ $ref: '#/sets/b' }] },
        b: { sources: [{ $ref: '#/sets/a' }] },
      },
      resolutionOrder: [{ $ref: '#/sets/a' }],
    }).expect(422)
  })

  it('refuses an extension of ours that is none', async () => {
    const pairs = [{ foreground: 'ink', background: 'nowhere', use: 'text' }, { use: 'x' }]
    const { body } = await post(
      JSON.stringify({ $extensions: { 'dev.dyewright': { pairs, themes: 'all', settings: 1 } } }),
    ).expect(422)
    const at = '/$extensions/dev.dyewright'
    const pointers = body.errors.map((fault: { pointer: string }) => fault.pointer)
    expect(pointers).toEqual(expect.arrayContaining([`${at}/themes`, `${at}/settings`]))
    expect(pointers).toContain(`${at}/pairs/1/foreground`)
  })
})

describe('contexts as themes', () => {
  const file = {
    version: '2025.10',
    sets: { core: { sources: [{ paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000') }] } },
    modifiers: {
      mood: {
        default: 'Bright Day',
        contexts: {
          Night: [{ paper: dtcgHex('#000011'), ink: dtcgHex('#eeeeff') }],
          'Bright Day': [],
        },
      },
      density: { default: 'wide', contexts: { wide: [], tight: [] } },
    },
    resolutionOrder: [
      { $ref: '#/sets/core' },
      { $ref: '#/modifiers/mood' },
      { $ref: '#/modifiers/density' },
    ],
  }

  it('refuses a file that does not say what the ground is, and answers one beside the query', async () => {
    await test.createSystem('foreign')
    const url = '/v1/systems/foreign/imports'
    const { body } = await system.maintainer.post(url).send(file).expect(422)
    expect(body.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/modifiers/mood/contexts/Bright Day',
      '/modifiers/mood/contexts/Bright Day',
      '/modifiers/mood/contexts/Night',
      '/modifiers/mood/contexts/Night',
    ])
    const { body: done } = await system.maintainer
      .post(`${url}?ground=paper&ink=ink`)
      .send(file)
      .expect(200)
    expect(done.counts.themes.added).toBe(2)
    expect(done.notes).toMatchObject([{ kind: 'left-out', pointer: '/modifiers/density' }])
    const { body: themes } = await system.maintainer.get('/v1/systems/foreign/themes')
    expect(themes.items.map(({ key, name }: Record<string, string>) => [key, name])).toEqual([
      ['bright-day', 'Bright Day'],
      ['night', 'Night'],
    ])
    const { body: paper } = await system.maintainer.get('/v1/systems/foreign/tokens/paper')
    expect(paper.resolved.night.rest.hex).toBe('#000011')
    const { body: again } = await system.maintainer.post(url).send(file).expect(200)
    expect(again.written).toBe(false)
  })
})

describe('older files', () => {
  const legacy = {
    brand: {
      $type: 'color',
      a: { $value: '#1a73e8' },
      b: { $value: '#F008' },
      n: { $value: '{brand.a}' },
    },
    size: { $type: 'number', $value: 3 },
  }

  it('refuses text for colours unless it is asked for, and then lists what was converted', async () => {
    const { body } = await post(JSON.stringify(legacy)).expect(422)
    expect(body.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/brand/a/$value',
      '/brand/b/$value',
    ])
    const { body: done } = await post(JSON.stringify(legacy), '?legacyHex=true').expect(200)
    expect(done.notes.map(({ kind, pointer }: Record<string, string>) => [kind, pointer])).toEqual([
      ['converted', '/brand/a/$value'],
      ['converted', '/brand/b/$value'],
    ])
    const { body: b } = await system.maintainer.get(`${system.url}/tokens/brand.b`).expect(200)
    expect(b.resolved.light.rest.hex).toBe('#ff000088')
  })
})
