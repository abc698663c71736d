import { sha256Hex } from '#api/sha256.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import type { AuditActor } from '#api/caller.ts'

/** One act, as its hash covers it. */
export interface AuditEntry {
  readonly chainId: string
  /** Counts up from 1 within the chain, without a gap. */
  readonly seq: number
  /** The database's time, UTC. */
  readonly at: Date
  readonly actor: AuditActor
  readonly action: string
  readonly subject: string
  /** Canonical JSON text. */
  readonly details: string
}

export interface SealedEntry extends AuditEntry {
  readonly previousHash: string
  readonly hash: string
}

/** What stands before the first entry of a chain. */
export const CHAIN_START = '0'.repeat(64)

/** Answers the SHA-256 over the hash before and the entry as canonical JSON, in hexadecimal. */
export const entryHash = (previousHash: string, entry: AuditEntry): string =>
  sha256Hex(
    `${previousHash}\n${canonicalJson({
      chain: entry.chainId,
      seq: entry.seq,
      at: entry.at.toISOString(),
      actor: { kind: entry.actor.kind, id: entry.actor.id },
      action: entry.action,
      subject: entry.subject,
      details: entry.details,
    })}`,
  )

/**
 * Answers the first place at which a chain, in order of `seq`, is not what was written; nothing where it is
 * whole. A cut-off end shows only against the chain's head or a checkpoint kept elsewhere.
 */
export function findTampering(entries: readonly SealedEntry[]): number | undefined {
  let previous = CHAIN_START
  for (const [index, entry] of entries.entries()) {
    const isWhole =
      entry.seq === index + 1 &&
      entry.previousHash === previous &&
      entry.hash === entryHash(previous, entry)
    if (!isWhole) return index + 1
    previous = entry.hash
  }
  return undefined
}
