import { createHash } from 'node:crypto'

/** Answers the SHA-256 of a text (as UTF-8) or of bytes, in lower-case hexadecimal. */
export const sha256Hex = (content: string | Uint8Array): string =>
  createHash('sha256').update(content).digest('hex')
