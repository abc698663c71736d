import { createHash } from 'node:crypto'

/**
 * Answers the one JSON text of a value: members sorted by code unit, no white space, absent where undefined.
 * @throws {TypeError} for a number that JSON cannot hold
 * @see https://www.rfc-editor.org/rfc/rfc8785
 */
export function canonicalJson(value: unknown): string {
  return JSON.stringify(sorted(value))
}

function sorted(value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new TypeError(`JSON has no ${value}`)
  }
  if (typeof value !== 'object' || value === null) return value
  if (value instanceof Date) return value.toJSON()
  if (Array.isArray(value)) return value.map(sorted)
  const members = Object.entries(value).filter(([, member]) => member !== undefined)
  members.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return Object.fromEntries(members.map(([name, member]) => [name, sorted(member)]))
}

/** Answers the SHA-256 of a text (as UTF-8) or of bytes, in lower-case hexadecimal. */
export const sha256Hex = (content: string | Uint8Array): string =>
  createHash('sha256').update(content).digest('hex')
