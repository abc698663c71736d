import supertest from 'supertest'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createAgent, emailOf, TEST_PASSWORD } from '#tests/support/people.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

/** A further session of the engineer. */
const freshSession = async () => {
  const agent = createAgent(test.app)
  const credentials = { email: emailOf('engineer'), password: TEST_PASSWORD }
  await agent.post('/v1/sign-in').send(credentials).expect(200)
  return { agent }
}

it('leaves the other sessions of the same person', async () => {
  const [first, second] = [await freshSession(), await freshSession()]
  const { headers } = await first.agent.post('/v1/sign-out').expect(204)
  expect(String(headers['set-cookie'])).toMatch(/dyewright=;.*Expires=Thu, 01 Jan 1970/)
  await first.agent.get('/v1/me').expect(401)
  await second.agent.get('/v1/me').expect(200)
})

it('refuses the cookie that was good before the sign-out', async () => {
  const answer = await supertest(test.app)
    .post('/v1/sign-in')
    .send({ email: emailOf('engineer'), password: TEST_PASSWORD })
  const cookie = String(answer.headers['set-cookie']?.[0]).split(';')[0] ?? ''
  await supertest(test.app).get('/v1/me').set('Cookie', cookie).expect(200)
  await supertest(test.app).post('/v1/sign-out').set('Cookie', cookie).expect(204)
  await supertest(test.app).get('/v1/me').set('Cookie', cookie).expect(401)
})

it('refuses nobody, a session that has ended, and another site', async () => {
  await test.anonymous.post('/v1/sign-out').expect(401)
  const { agent } = await freshSession()
  await agent.post('/v1/sign-out').set('Sec-Fetch-Site', 'cross-site').expect(403)
  await agent.get('/v1/me').expect(200)
  await agent.post('/v1/sign-out').set('Sec-Fetch-Site', 'same-origin').expect(204)
  await agent.post('/v1/sign-out').expect(401)
})
