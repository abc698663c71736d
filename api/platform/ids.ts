import { randomBytes } from 'node:crypto'

/** Makes an id no other call ever makes: `newId('tok')` → `tok_…`. */
export type NewId = (prefix: string) => string

/** Crockford's base 32, whose order is the order of the values. */
const ALPHABET = '0123456789abcdefghjkmnpqrstvwxyz'

const encode = (value: bigint, length: number): string => {
  let text = ''
  let rest = value
  for (let place = 0; place < length; place += 1) {
    text = ALPHABET[Number(rest & 31n)] + text
    rest >>= 5n
  }
  return text
}

/**
 * Answers ids that sort by the time of their making, in one process strictly: 48 bits of milliseconds and 80
 * random bits, which count up within a millisecond.
 * @param now milliseconds since 1970
 */
export function createNewId(now: () => number = Date.now): NewId {
  let lastMs = 0
  let tail = 0n
  return (prefix) => {
    const ms = Math.max(now(), lastMs)
    // Two bits stay free above the random ones, so that counting up never wraps within a millisecond.
    tail = ms === lastMs ? tail + 1n : BigInt(`0x${randomBytes(10).toString('hex')}`) >> 2n
    lastMs = ms
    return `${prefix}_${encode(BigInt(ms), 10)}${encode(tail, 16)}`
  }
}
