import { describe, expect, it } from 'vitest'
import { delayBeforeRetry } from '#scripts/gate/retry.ts'
import { NoAnswer } from '#scripts/gate/send.ts'
import { ApiError } from '#shared/client/client.ts'

const first = { attempt: 1, remainingMs: 60_000 }
const answered = (status: number, seconds?: number) => new ApiError(status, undefined, seconds)

describe('the delay before another attempt', () => {
  it('answers a doubling back-off, and an end', () => {
    const delays = [1, 2, 3, 4].map((attempt) =>
      delayBeforeRetry(answered(503), { attempt, remainingMs: 60_000 }),
    )
    expect(delays).toEqual([500, 1000, 2000, undefined])
  })

  it.each(['ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'EAI_AGAIN'])('answers one after %s', (code) => {
    expect(delayBeforeRetry(new NoAnswer(code, ''), first)).toBe(500)
  })

  it.each([429, 502, 503, 504])('answers one after %i', (status) => {
    expect(delayBeforeRetry(answered(status), first)).toBe(500)
  })

  it.each([301, 400, 401, 403, 404, 409, 413, 422, 500, 501])('refuses one after %i', (status) => {
    expect(delayBeforeRetry(answered(status), first)).toBeUndefined()
  })

  it('refuses one after a time-out, an unknown host, a broken certificate, a fault of its own', () => {
    for (const code of ['TIMEOUT', 'ENOTFOUND', 'CERT_HAS_EXPIRED']) {
      expect(delayBeforeRetry(new NoAnswer(code, ''), first)).toBeUndefined()
    }
    expect(delayBeforeRetry(new TypeError('x'), first)).toBeUndefined()
  })

  it('answers what the service asked for, unless the run would end before', () => {
    expect(delayBeforeRetry(answered(429, 7), first)).toBe(7000)
    expect(delayBeforeRetry(answered(429, 7), { attempt: 1, remainingMs: 6000 })).toBeUndefined()
  })
})
