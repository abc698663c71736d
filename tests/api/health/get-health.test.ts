import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

it('answers anybody that the process runs, without a query', async () => {
  const { pool } = test.service.platform.database
  let queries = 0
  const count = () => {
    queries += 1
  }
  pool.on('acquire', count)
  const { body, headers } = await test.anonymous.get('/healthz').expect(200)
  pool.off('acquire', count)
  expect(body).toEqual({ status: 'up' })
  expect(headers['cache-control']).toBe('no-store')
  expect(queries).toBe(0)
})

it('answers a key that nobody has, and from the moment it is stopping', async () => {
  await test.withKey('dyw_ci_x').get('/healthz').expect(200)
  test.services.health.stop()
  await test.anonymous.get('/healthz').expect(200)
  await test.anonymous.get('/readyz').expect(503)
})

it('refuses other methods', async () => {
  const { headers } = await test.anonymous.delete('/healthz').expect(405)
  expect(headers.allow).toContain('GET')
})
