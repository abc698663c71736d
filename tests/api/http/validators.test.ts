import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

/** Reads of what is there in a new system: a path names no item but the system. */
const reads = contracts
  .filter(({ method, access }) => method === 'GET' && access !== 'anyone')
  .map(({ path }) => path.replace('{system}', 'larkhaven'))
  .filter((path) => !path.includes('{'))

describe('a read', () => {
  it.each(reads)('answers %s with a strong validator, and 304 to who has it', async (path) => {
    const { headers } = await test.people.maintainer.get(path).expect(200)
    expect(headers.etag).toMatch(/^"[^"]+"$/)
    const again = test.people.maintainer.get(path).set('If-None-Match', String(headers.etag))
    expect((await again.expect(304)).text).toBe('')
  })
})
