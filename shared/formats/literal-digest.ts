import { canonicalJson } from './canonical-json.ts'

const MASK = 0xff_ff_ff_ff_ff_ff_ff_ffn
const OFFSET = 0xcb_f2_9c_e4_84_22_23_25n
const PRIME = 0x1_00_00_00_01_b3n

/**
 * Names a value that a file holds beside the rule it follows from, so that a hand's change of it shows.
 * No secret: 64 bits of FNV-1a over the canonical JSON (RFC 8785), 16 hexadecimal digits.
 * @see https://datatracker.ietf.org/doc/html/draft-eastlake-fnv
 */
export function literalDigest(value: unknown): string {
  let hash = OFFSET
  for (const byte of new TextEncoder().encode(canonicalJson(value))) {
    hash = ((hash ^ BigInt(byte)) * PRIME) & MASK
  }
  return hash.toString(16).padStart(16, '0')
}
