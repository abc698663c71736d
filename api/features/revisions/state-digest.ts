import { createHash } from 'node:crypto'
import { sha256Hex } from '#api/sha256.ts'
import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

/** Items are never changed in place, so that an item that stays is hashed once. */
const digests = new WeakMap<object, string>()

function itemDigest(item: object): string {
  const known = digests.get(item)
  if (known !== undefined) return known
  const digest = createHash('sha256').update(canonicalJson(item)).digest('hex')
  digests.set(item, digest)
  return digest
}

/**
 * Names the whole state of a revision: SHA-256, hexadecimal, over one line an item, `<kind> <digest>\n`, where
 * the digest is the SHA-256 of the item's canonical JSON (RFC 8785) as the governed system holds it, other
 * items by id. Lines come in the order settings, states, prefix rules, themes (base first), tokens (ledger
 * order), pairs (order of declaration), distinct sets (in the order they were made); last, where there is one, `other` with the SHA-256 of the text kept verbatim.
 */
export function stateDigest(model: GovernedSystem): string {
  const lines: [kind: string, items: readonly object[]][] = [
    ['settings', [model.settings]],
    ['states', [model.states]],
    ['prefix', model.prefixes],
    ['theme', model.themes],
    ['token', model.tokens],
    ['pair', model.pairs],
    ['distinct-set', model.distinctSets ?? []],
  ]
  const hash = createHash('sha256')
  for (const [kind, items] of lines) {
    for (const item of items) hash.update(`${kind} ${itemDigest(item)}\n`)
  }
  if (model.remainder !== undefined) hash.update(`other ${sha256Hex(model.remainder)}\n`)
  return hash.digest('hex')
}
