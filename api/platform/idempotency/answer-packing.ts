import { promisify } from 'node:util'
import { gunzip, gzip } from 'node:zlib'
import type { KeptAnswer } from './idempotency-store.ts'

/** A check of a large system is answered in more than a row, or a packet of the database, can take. */
const PLAIN_AT_MOST = 2 ** 20
const [PACKED, HOW] = ['Content-Encoding', 'gzip']

const compress = promisify(gzip)
const expand = promisify(gunzip)

/** Answers an answer as it is kept: a large body gzipped, in base64, and a header that says so. */
export async function packAnswer({ status, headers, body }: KeptAnswer): Promise<KeptAnswer> {
  if (body.length <= PLAIN_AT_MOST) return { status, headers, body }
  const packed = await compress(body)
  return { status, headers: { ...headers, [PACKED]: HOW }, body: packed.toString('base64') }
}

/** Answers what {@link packAnswer} was given. */
export async function unpackAnswer({ status, headers, body }: KeptAnswer): Promise<KeptAnswer> {
  if (headers[PACKED] !== HOW) return { status, headers, body }
  const { [PACKED]: _, ...own } = headers
  const expanded = await expand(Buffer.from(body, 'base64'))
  return { status, headers: own, body: expanded.toString('utf8') }
}
