import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const TOKENS = '/v1/systems/larkhaven/tokens'
/** The bytes as they are: the client would write a Buffer as JSON. */
const asIs = (body: string) => body
const post = (body: string | Buffer, type = 'application/json') =>
  test.people.maintainer.post(TOKENS).set('Content-Type', type).serialize(asIs).send(body)
const nested = (depth: number) => `${'['.repeat(depth)}${']'.repeat(depth)}`
const code = ({ body }: { body: { type: string } }) => body.type.split('/').at(-1)

describe('unreadable', () => {
  it.each([
    ['broken JSON', '{"name": '],
    ['nothing', ''],
    ['two values', '{} {}'],
    ['a nesting of 33', nested(33)],
    ['a nesting of 500,000', nested(500_000)],
    ['brackets that only close', ']]]]'],
    ['bytes that are not UTF-8', Buffer.from([0x22, 0xff, 0xfe, 0x22])],
    ['200,000 elements', `[${'0,'.repeat(199_999)}0]`],
  ])('refuses %s with 400', async (_, body) => {
    const answer = await post(body).expect(400)
    expect(code(answer)).toBe('request-unreadable')
  })

  it.each([
    ['a name', { name: 'half \ud800', value: 'red' }, '/name'],
    ['a text', { name: 'a', value: 'red', description: '\udfff other half' }, '/description'],
    [
      'a text within',
      { name: 'a', value: 'red', deprecated: { reason: '\ud83d' } },
      '/deprecated/reason',
    ],
  ])('refuses half of a character in %s with 400, and says where', async (_, body, pointer) => {
    // JSON.stringify escapes a lone surrogate, so the bytes are UTF-8 and the text is none (RFC 8259, 8.2).
    const answer = await post(JSON.stringify(body)).expect(400)
    expect(code(answer)).toBe('request-unreadable')
    expect(answer.body.errors).toMatchObject([{ pointer }])
  })

  it('refuses half of a character in the name of a member', async () => {
    await post('{"\\uD83D": 1}').expect(400)
  })

  it('reads a character that is escaped in two halves', async () => {
    await post('{"name": "a.\\ud83c\\udfa8", "value": "red"}').expect(201)
  })

  it('reads a nesting of 32, and brackets in strings are none', async () => {
    await post(nested(32)).expect(422)
    await post(JSON.stringify({ name: '['.repeat(200), value: '"}}' })).expect(422)
  })
})

describe('size', () => {
  it('refuses more than 1 MiB with 413 and says the limit', async () => {
    const { body } = await post(JSON.stringify({ name: 'x'.repeat(2 ** 20) })).expect(413)
    expect(body).toMatchObject({ type: '/problems/request-too-large', limitBytes: 2 ** 20 })
  })

  it('reads 1 MiB exactly', async () => {
    await post(`{"name":"${'x'.repeat(2 ** 20 - 11)}"}`).expect(422)
  })

  it('takes more for a check', async () => {
    const body = JSON.stringify({ source: { branch: 'x'.repeat(2 * 2 ** 20) } })
    await test.people.maintainer
      .post('/v1/systems/larkhaven/checks')
      .set('Content-Type', 'application/json')
      .send(body)
      .expect(422)
  })
})

describe('media type', () => {
  it.each([
    'text/plain',
    'application/xml',
    'multipart/form-data; boundary=x',
    'application/x-www-form-urlencoded',
    'application/json; charset=utf-16',
    'application/jsonp',
  ])('refuses %s with 415', async (type) => {
    expect(code(await post('{}', type).expect(415))).toBe('media-type-unsupported')
  })

  it.each([
    'application/json; charset=UTF-8',
    'application/json;charset="utf-8"',
    'application/design-tokens+json',
    'APPLICATION/merge-patch+JSON',
  ])('reads %s', async (type) => {
    await post('{}', type).expect(422)
  })

  it('refuses a compressed body with 415', async () => {
    await post('{}').set('Content-Encoding', 'gzip').expect(415)
  })
})

describe('faults', () => {
  it('answers every fault at once, each with its pointer', async () => {
    const { body } = await post(
      JSON.stringify({
        name: '$x',
        value: { colorSpace: 'oklch', components: [0.5, 'x', 200], alpha: 2 },
        states: ['hover', 'pressed'],
        values: { 'Not A Slug': { rest: '#fff' }, light: { pressed: '#fff' } },
        'a/b~c': 1,
        locked: 'yes',
      }),
    ).expect(422)
    const pointers = body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()
    expect(pointers).toEqual([
      '/a~1b~0c',
      '/locked',
      '/name',
      '/states/1',
      '/value/alpha',
      '/value/components/1',
      '/values/Not A Slug',
      '/values/light/pressed',
    ])
  })

  it('answers faults of value beside faults of shape', async () => {
    const pointersOf = async (sent: object) => {
      const { body } = await post(JSON.stringify(sent)).expect(422)
      return body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()
    }
    expect(await pointersOf({ name: 'a..b', value: 'color-mix(in oklab, red, blue)' })).toEqual([
      '/name',
      '/value',
    ])
    const ranges = { colorSpace: 'srgb', components: [1.5, 2, -1], alpha: 2 }
    const components = ['/value/components/0', '/value/components/1', '/value/components/2']
    expect(await pointersOf({ name: 'a.b', value: ranges })).toEqual([
      '/value/alpha',
      ...components,
    ])
    const mixed = { ...ranges, components: [1.5, 'x', -1], hex: 'red', extra: 1 }
    expect(await pointersOf({ name: 'a.b', value: mixed })).toEqual([
      '/value/alpha',
      ...components,
      '/value/extra',
      '/value/hex',
    ])
    const dark = { rest: 'nope', hover: { ...ranges, alpha: 1 } }
    expect(await pointersOf({ name: '$', value: '#12', values: { dark } })).toEqual([
      '/name',
      '/value',
      '/values/dark/hover/components/0',
      '/values/dark/hover/components/1',
      '/values/dark/hover/components/2',
      '/values/dark/rest',
    ])
  })

  it('says what is wrong with a color once, and why', async () => {
    const { body } = await post('{"name": "a", "value": "nope"}').expect(422)
    expect(body.errors).toHaveLength(1)
    expect(body.errors[0].detail).toContain('nope')
    const long = JSON.stringify({ name: 'a', value: 'x'.repeat(256) })
    expect((await post(long).expect(422)).body.errors).toHaveLength(1)
  })

  it('answers 100 faults at most, and how many more there are', async () => {
    const many = Object.fromEntries(Array.from({ length: 5000 }, (_, at) => [`member ${at}`, at]))
    const { body, text } = await post(JSON.stringify(many)).expect(422)
    expect(body.errors).toHaveLength(100)
    expect(body.more).toBe(5002 - 100)
    expect(text.length).toBeLessThan(20_000)
  })

  it('leaves out how many more there are where all are named', async () => {
    const { body } = await post('{}').expect(422)
    expect(body.errors).toHaveLength(2)
    expect(body).not.toHaveProperty('more')
  })

  it('answers faults under a long name no longer than its request', async () => {
    const bad = Array.from({ length: 90 }, (_, at) => [`t${at}`, { $value: at }])
    const tokens = { ['n'.repeat(50_000)]: { $type: 'color', ...Object.fromEntries(bad) } }
    const { body, text } = await test.people.maintainer
      .post('/v1/systems/larkhaven/checks')
      .send({ tokens })
      .expect(422)
    expect(body.errors.length).toBeGreaterThan(0)
    expect(body.errors.length + body.more).toBe(90)
    expect(text.length).toBeLessThan(200_000)
  })

  it('tells an absent member from one of the wrong type', async () => {
    const { body } = await post('{"value": 12}').expect(422)
    expect(body.errors).toEqual([
      { pointer: '/name', detail: 'Missing' },
      { pointer: '/value', detail: 'Expected text or an object' },
    ])
  })

  it('tells of a value of the wrong type nothing but that', async () => {
    const { body } = await test.anonymous
      .post('/v1/sign-in')
      .send({ email: 'a@b.example', password: [] })
      .expect(422)
    expect(body.errors).toEqual([{ pointer: '/password', detail: 'Expected text' }])
  })

  it('points at the whole body where that is of the wrong type', async () => {
    const { body } = await post('[]').expect(422)
    expect(body.errors).toEqual([{ pointer: '', detail: 'Expected an object' }])
  })

  it.each(['__proto__', '\\u005f_proto__'])('refuses the name %s aloud', async (name) => {
    const { body } = await post(
      `{"name":"a","value":"#fff","values":{"${name}":{"rest":"#fff"}}}`,
    ).expect(422)
    expect(body.errors[0].pointer).toBe('/values/__proto__')
  })
})

it('refuses who is unknown before it reads a body', async () => {
  await test.anonymous.post(TOKENS).set('Content-Type', 'text/plain').send('x').expect(401)
})
