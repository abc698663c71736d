import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const get = (url: string) => test.people.maintainer.get(url)

describe('query', () => {
  it.each([
    ['an unknown parameter', 'colour=red', 'colour'],
    ['a repeated one', 'limit=1&limit=2', 'limit'],
    ['a number out of range', 'limit=0', 'limit'],
    ['a text for a number', 'limit=ten', 'limit'],
    ['a hexadecimal number', 'limit=0x10', 'limit'],
    ['a number after a space', 'limit=%205', 'limit'],
    ['a number with a zero before it', 'limit=05', 'limit'],
    ['a number with an exponent', 'limit=1e1', 'limit'],
    ['no number', 'limit=', 'limit'],
    ['a word that is none of those known', 'view=wide', 'view'],
    ['broken percent-encoding', 'named=%zz', 'named'],
    ['bytes that are not UTF-8', 'named=%ff%fe', 'named'],
    ['a cursor that nobody gave', 'cursor=abc', 'cursor'],
    ['nested names', 'limit[a]=1', 'limit[a]'],
  ])('refuses %s with 400 and names it', async (_, query, parameter) => {
    const { body } = await get(`/v1/systems/larkhaven/tokens?${query}`).expect(400)
    expect(body.type).toBe('/problems/parameter-invalid')
    expect(body.errors.map((fault: { parameter: string }) => fault.parameter)).toEqual([parameter])
  })

  it('says what a parameter may be that can be given once or more often', async () => {
    const { body } = await get('/v1/systems/larkhaven/breaches?status=shut').expect(400)
    const detail = 'Expected "open" or "waived" or "resolved"'
    expect(body.errors).toEqual([{ parameter: 'status', detail }])
  })

  it('says that a parameter is unknown, not a member', async () => {
    const { body } = await get('/v1/systems/larkhaven/pairs?colour=red').expect(400)
    expect(body.errors).toEqual([{ parameter: 'colour', detail: 'Unknown parameter' }])
  })

  it('says that a limit is a whole number, also where it is below the least', async () => {
    const detailOf = async (limit: string) =>
      (await get(`/v1/systems/larkhaven/pairs?limit=${limit}`).expect(400)).body.errors[0].detail
    expect(await detailOf('1.5')).toBe('Expected a whole number')
    expect(await detailOf('-5')).toBe('Expected at least 1')
  })

  it('refuses any parameter where none is known', async () => {
    const { body } = await get('/v1/me?verbose=1').expect(400)
    expect(body.errors).toEqual([{ parameter: 'verbose', detail: 'Unknown parameter' }])
  })

  it('reads a plus as a space and an empty query as none', async () => {
    await get('/v1/systems/larkhaven/tokens?named=a+b').expect(200)
    await get('/v1/systems/larkhaven/tokens?').expect(200)
  })
})

describe('path', () => {
  it.each(['/v1/systems/%zz', '/v1/systems/larkhaven/tokens/%ff'])(
    'refuses the encoding of %s with 400',
    async (url) => {
      const { body } = await get(url).expect(400)
      expect(body.type).toBe('/problems/request-unreadable')
    },
  )

  it('refuses what cannot be a key of a system with 400', async () => {
    const { body } = await get('/v1/systems/Not%20A%20Slug').expect(400)
    expect(body.errors[0].parameter).toBe('system')
  })

  it.each(['0x1', '01', '1.0', '%201', '1e0', '-0'])(
    'refuses %s as the number of a revision with 400',
    async (number) => {
      const { body } = await get(`/v1/systems/larkhaven/revisions/${number}`).expect(400)
      expect(body.errors).toEqual([{ parameter: 'number', detail: 'Expected a whole number' }])
    },
  )

  it.each([
    '/v1/nothing',
    '/v1/systems/larkhaven/',
    '/v1/Systems',
    '/v1/systems/larkhaven/themes/light.exe',
    '/v1/systems/larkhaven/tokens/a%00b',
  ])('refuses %s with 404', async (url) => {
    await get(url).expect(404)
  })
})

describe('method', () => {
  it('refuses one that an address does not take with 405, and lists those it does', async () => {
    const { headers, body } = await test.people.maintainer.delete('/v1/systems').expect(405)
    expect(headers.allow?.split(', ').sort()).toEqual(['GET', 'HEAD', 'OPTIONS', 'POST'])
    expect(body.type).toBe('/problems/method-not-allowed')
  })

  it.each([
    ['post', 'themes/light', 'DELETE, GET, HEAD, OPTIONS, PATCH, PUT'],
    ['put', 'themes/light.css', 'GET, HEAD, OPTIONS'],
    ['delete', 'themes/light%2Ejson', 'GET, HEAD, OPTIONS'],
    ['post', 'tokens/a.b', 'DELETE, GET, HEAD, OPTIONS, PATCH'],
  ] as const)(
    'lists for %s %s what a theme, its file and a token take',
    async (method, path, allow) => {
      const answer = await test.people.maintainer[method](`/v1/systems/larkhaven/${path}`).expect(
        405,
      )
      expect(answer.headers.allow?.split(', ').sort().join(', ')).toBe(allow)
    },
  )

  it('answers HEAD as GET, without the body', async () => {
    const { headers: full } = await get('/v1/systems/larkhaven/members').expect(200)
    const { headers, text } = await test.people.maintainer
      .head('/v1/systems/larkhaven/members')
      .expect(200)
    expect(headers.etag).toBe(full.etag)
    expect(text ?? '').toBe('')
  })
})
