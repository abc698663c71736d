import { randomBytes } from 'node:crypto'
import { sha256Hex } from '#api/sha256.ts'

const ALPHABET = 'abcdefghijkmnpqrstuvwxyz23456789'
const RANDOM_LETTERS = 32
const CHECKSUM_LETTERS = 6

const lettersOf = (bytes: Uint8Array): string =>
  Array.from(bytes, (byte) => ALPHABET[byte & 31]).join('')

const checksumOf = (text: string): string =>
  lettersOf(Buffer.from(sha256Hex(text), 'hex').subarray(0, CHECKSUM_LETTERS))

/** Answers 256 random bits for a session's cookie. */
export const newSessionToken = (): string => randomBytes(32).toString('base64url')

/** Answers a new key, `dyw_<kind>_` with 160 random bits and a checksum of 30. */
export function newApiKey(kind: 'read' | 'ci'): string {
  const head = `dyw_${kind}_${lettersOf(randomBytes(RANDOM_LETTERS))}`
  return head + checksumOf(head)
}

const KEY_SHAPE = new RegExp(
  `^(dyw_(?:read|ci)_[${ALPHABET}]{${RANDOM_LETTERS}})([${ALPHABET}]{${CHECKSUM_LETTERS}})$`,
)

/** Whether a text can be a key at all; one that is mistyped costs no query. */
export function isApiKeyShaped(text: string): boolean {
  const [, head, checksum] = KEY_SHAPE.exec(text) ?? []
  return head !== undefined && checksumOf(head) === checksum
}
