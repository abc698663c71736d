import { expect, it } from 'vitest'
import { sha256Hex } from '#api/sha256.ts'

/** @see https://csrc.nist.gov/projects/cryptographic-standards-and-guidelines/example-values (SHA-256 of "abc") */
it('answers the published SHA-256', () => {
  expect(sha256Hex('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad')
})
