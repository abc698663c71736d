import supertest from 'supertest'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { compose } from '#api/compose.ts'
import { createPasswords, type Passwords } from '#api/platform/passwords.ts'
import { createTestApp, type TestApp, testConfig } from '#tests/support/app.ts'
import { emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

const real = createPasswords({ memoryKiB: 1024, passes: 1 })
let evaluated = 0
const passwords: Passwords = {
  hash: real.hash,
  verify: (hashed, password) => {
    evaluated += 1
    return real.verify(hashed, password)
  },
}

let test: TestApp
beforeAll(async () => {
  test = await createTestApp({ platform: { passwords } })
})
afterAll(() => test.close())
afterEach(() => sql('delete from rate_counters'))

const sql = async (statement: string) => {
  const [rows] = await test.service.platform.database.pool.query<never[]>(statement)
  return rows as Record<string, unknown>[]
}
const credentials = { email: emailOf('engineer'), password: TEST_PASSWORD }
const signIn = (body: object) => test.anonymous.post('/v1/sign-in').send(body)
/** The same service as it is reached at another address. */
const signInAt = (publicUrl: string) => {
  const config = testConfig(test.database.serveUrl, { PUBLIC_URL: publicUrl })
  const { app } = compose({ config, platform: test.service.platform })
  return supertest(app).post('/v1/sign-in').set('Host', new URL(publicUrl).host).send(credentials)
}
const cookieOf = (headers: Record<string, unknown>) =>
  String((headers['set-cookie'] as string[])[0])

describe('right', () => {
  it('answers who has signed in and sets a cookie that no script reads', async () => {
    const { body, headers } = await signIn(credentials).expect(200)
    expect(body).toMatchObject({ user: { name: 'Tove Lind' }, roles: { larkhaven: 'engineer' } })
    const cookie = cookieOf(headers)
    expect(cookie).toMatch(/^dyewright=[\w-]{43};/)
    expect(cookie).toContain('HttpOnly')
    expect(cookie).toContain('SameSite=Strict')
    expect(cookie).toContain('Path=/')
    expect(headers['cache-control']).toBe('no-store')
  })

  it('takes the address in any case and the password however its letters are composed', async () => {
    await signIn({ ...credentials, email: ` ${emailOf('engineer').toUpperCase()} ` }).expect(200)
    const decomposed = 'cafe\u0301 au lait du matin'
    const account = { email: 'cafe@quay.test', name: 'Café', password: decomposed, isAdmin: false }
    await test.services.accounts.create(account)
    await signIn({ email: 'cafe@quay.test', password: decomposed.normalize('NFC') }).expect(200)
  })

  it('leaves neither password nor cookie in the database', async () => {
    const { headers } = await signIn(credentials).expect(200)
    const token = /dyewright=([\w-]+)/.exec(cookieOf(headers))?.[1] ?? ''
    const rows = JSON.stringify([
      await sql('select * from users'),
      await sql('select * from sessions'),
      await sql('select * from audit_entries'),
    ])
    expect(rows).not.toContain(token)
    expect(rows).not.toContain(TEST_PASSWORD)
    expect(rows).toContain('$argon2id$')
  })

  it('makes the cookie __Host- and Secure where the service is reached by https', async () => {
    const { headers } = await signInAt('https://dye.quay.test').expect(200)
    const cookie = cookieOf(headers)
    expect(cookie).toMatch(/^__Host-dyewright=[\w-]{43};/)
    expect(cookie).toContain('Secure')
    expect(headers['strict-transport-security']).toContain('max-age=')
  })

  it('refuses a password that came over plain http from another machine', async () => {
    const { body, headers } = await signInAt('http://dye.quay.test').expect(403)
    expect(body.detail).toContain('https')
    expect(headers['set-cookie']).toBeUndefined()
    expect(headers['strict-transport-security']).toBeUndefined()
  })
})

describe('wrong', () => {
  it('answers the same for a wrong password and for an address that nobody has', async () => {
    evaluated = 0
    const { body: wrong } = await signIn({ ...credentials, password: 'x' }).expect(401)
    const { body: nobody } = await signIn({ email: 'nobody@quay.test', password: 'x' }).expect(401)
    expect({ ...nobody, requestId: '' }).toEqual({ ...wrong, requestId: '' })
    expect(evaluated).toBe(2)
  })

  it('refuses an account that was ended', async () => {
    const account = {
      email: 'gone@quay.test',
      name: 'Gone',
      password: TEST_PASSWORD,
      isAdmin: false,
    }
    await test.services.accounts.create(account)
    await sql(`update users set deactivated_at = utc_timestamp(3) where email = 'gone@quay.test'`)
    await signIn({ email: 'gone@quay.test', password: TEST_PASSWORD }).expect(401)
  })

  it('refuses what is missing or unknown, with every pointer', async () => {
    const { body } = await signIn({ mail: 'x' }).expect(422)
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/email',
      '/mail',
      '/password',
    ])
  })
})

describe('guessing', () => {
  it('refuses the sixth guess for a while, without evaluating it, even with the right password', async () => {
    for (let guess = 0; guess < 5; guess += 1)
      await signIn({ ...credentials, password: 'x' }).expect(401)
    evaluated = 0
    const { headers, body } = await signIn(credentials).expect(429)
    expect(body.type).toBe('/problems/requests-too-many')
    expect(Number(headers['retry-after'])).toBeGreaterThan(0)
    expect(evaluated).toBe(0)
  })

  it('evaluates few of many guesses that come at once', async () => {
    evaluated = 0
    const guesses = Array.from({ length: 40 }, () => signIn({ ...credentials, password: 'x' }))
    const statuses = (await Promise.all(guesses)).map(({ status }) => status)
    expect(evaluated).toBeLessThanOrEqual(5)
    expect(new Set(statuses)).toEqual(new Set([401, 429]))
  })

  it('leaves the account open to its owner at another address', async () => {
    const email = credentials.email
    for (let guess = 0; guess < 6; guess += 1) {
      await test.services.sessions
        .signIn({ email, password: 'x', address: '192.0.2.7' })
        .catch(() => {})
    }
    await signIn(credentials).expect(200)
  })

  it('forgets what was mistyped once the password is right', async () => {
    for (let round = 0; round < 3; round += 1) {
      for (let guess = 0; guess < 4; guess += 1) await signIn({ ...credentials, password: 'x' })
      await signIn(credentials).expect(200)
    }
  })
})
