import { describe, expect, it } from 'vitest'
import { readIdempotencyKey } from '#api/http/idempotency.ts'

describe('an Idempotency-Key', () => {
  // draft-ietf-httpapi-idempotency-key-header: a structured-field string (RFC 9651, section 3.3.3).
  it.each([
    ['"8e03978e-40d5-43dd-bc93-6894a57f9324"', '8e03978e-40d5-43dd-bc93-6894a57f9324'],
    ['  "a"  ', 'a'],
    [String.raw`"a\"b\\c"`, String.raw`a"b\c`],
    ['"two words, one key"', 'two words, one key'],
    [`"${'a'.repeat(255)}"`, 'a'.repeat(255)],
  ])('answers %s as its text', (field, key) => {
    expect(readIdempotencyKey(field)).toBe(key)
  })

  it('answers a key without quotes as the same key', () => {
    expect(readIdempotencyKey('8e03978e-40d5')).toBe(readIdempotencyKey('"8e03978e-40d5"'))
  })

  it('leaves a request without one alone', () => {
    expect(readIdempotencyKey(undefined)).toBeUndefined()
  })

  it.each([
    '',
    '""',
    '"a',
    'a"',
    '"a", "b"',
    'a, b',
    'a;b=1',
    '"a\\b"',
    '"é"',
    'é',
    '"\t"',
    `"${'a'.repeat(256)}"`,
    'a'.repeat(256),
  ])('refuses %j', (field) => {
    expect(() => readIdempotencyKey(field)).toThrow(
      expect.objectContaining({
        code: 'parameter-invalid',
        options: { faults: [expect.objectContaining({ parameter: 'Idempotency-Key' })] },
      }),
    )
  })
})
