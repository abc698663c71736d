import { randomBytes } from 'node:crypto'
import { expect, it } from 'vitest'
import { createNewId } from '#api/platform/ids.ts'
import { isApiKeyShaped, newApiKey, newSessionToken } from '#api/platform/secrets.ts'

it('answers keys that are told from anything else without a look-up', () => {
  for (const kind of ['read', 'ci'] as const) {
    const key = newApiKey(kind)
    expect(isApiKeyShaped(key)).toBe(true)
    expect(isApiKeyShaped(key.toUpperCase())).toBe(false)
    expect(isApiKeyShaped(` ${key}`)).toBe(false)
    expect(isApiKeyShaped(key.replace(`_${kind}_`, kind === 'ci' ? '_read_' : '_ci_'))).toBe(false)
  }
})

it('refuses every single mistyped letter and every swap of neighbours', () => {
  const key = newApiKey('ci')
  for (let at = 'dyw_ci_'.length; at < key.length; at += 1) {
    const other = key[at] === 'a' ? 'b' : 'a'
    expect(isApiKeyShaped(key.slice(0, at) + other + key.slice(at + 1))).toBe(false)
    const swapped = key.slice(0, at) + (key[at + 1] ?? '') + key[at] + key.slice(at + 2)
    if (swapped !== key) expect(isApiKeyShaped(swapped)).toBe(false)
  }
})

it('refuses random texts of the shape of a key', () => {
  const alphabet = 'abcdefghijkmnpqrstuvwxyz23456789'
  const bytes = randomBytes(38 * 20_000)
  let accepted = 0
  for (let at = 0; at < bytes.length; at += 38) {
    const text = Array.from(bytes.subarray(at, at + 38), (byte) => alphabet[byte & 31]).join('')
    if (isApiKeyShaped(`dyw_ci_${text}`)) accepted += 1
  }
  expect(accepted).toBe(0)
})

it('answers session tokens of 256 bits, never the same', () => {
  const tokens = new Set(Array.from({ length: 1000 }, newSessionToken))
  expect(tokens.size).toBe(1000)
  for (const token of tokens) expect(Buffer.from(token, 'base64url')).toHaveLength(32)
})

it('answers ids that sort by their making, within a millisecond and when the clock goes back', () => {
  const times = [1000, 1000, 1000, 999, 1001, 5, 1002]
  let call = 0
  const newId = createNewId(() => times[call++ % times.length] ?? 0)
  const ids = Array.from({ length: 700 }, () => newId('tok'))
  expect([...ids].sort()).toEqual(ids)
  expect(new Set(ids).size).toBe(ids.length)
  for (const id of ids) expect(id).toMatch(/^tok_[0-9a-hjkmnp-tv-z]{26}$/)
})
