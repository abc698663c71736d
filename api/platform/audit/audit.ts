import { eq, sql } from 'drizzle-orm'
import type { AuditActor } from '#api/caller.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import type { Executor } from '#api/platform/database.ts'
import { auditChains, auditEntries } from '#drizzle/schema/audit.ts'
import { CHAIN_START, entryHash } from './audit-chain.ts'

/** An act that is to be remembered. */
export interface AuditAct {
  /** A system's id; `instance` for what belongs to none. */
  readonly chain: string
  readonly actor: AuditActor
  /** For example `token.created`. */
  readonly action: string
  /** Id of what it was done to. */
  readonly subject: string
  /** JSON. No secret, no password, no key. */
  readonly details?: Readonly<Record<string, unknown>>
}

export interface AuditTrail {
  /** Adds an entry to its chain. Last in a transaction: the chain's row stays locked until it commits. */
  append(act: AuditAct): Promise<void>
}

/** The audit trail as one transaction writes it. */
export const createAuditTrail = (tx: Executor): AuditTrail => ({
  append: async (act) => {
    const end = (await lockEnd(tx, act.chain)) ?? (await startChain(tx, act.chain))
    const entry = {
      chainId: act.chain,
      seq: end.lastSeq + 1,
      at: end.now,
      actor: act.actor,
      action: act.action,
      subject: act.subject,
      details: canonicalJson(act.details ?? {}),
    }
    const hash = entryHash(end.lastHash, entry)
    const { actor, ...columns } = entry
    await tx.insert(auditEntries).values({
      ...columns,
      actorKind: actor.kind,
      actorId: actor.id,
      previousHash: end.lastHash,
      hash,
    })
    await tx
      .update(auditChains)
      .set({ lastSeq: entry.seq, lastHash: hash })
      .where(eq(auditChains.chainId, act.chain))
  },
})

interface ChainEnd {
  readonly lastSeq: number
  readonly lastHash: string
  readonly now: Date
}

async function lockEnd(tx: Executor, chainId: string): Promise<ChainEnd | undefined> {
  const [end] = await tx
    .select({
      lastSeq: auditChains.lastSeq,
      lastHash: auditChains.lastHash,
      now: sql<Date>`utc_timestamp(3)`.mapWith(auditEntries.at),
    })
    .from(auditChains)
    .where(eq(auditChains.chainId, chainId))
    .for('update')
  return end
}

/** Two first entries at once: the second waits in the insert and finds the row of the first. */
async function startChain(tx: Executor, chainId: string): Promise<ChainEnd> {
  await tx
    .insert(auditChains)
    .values({ chainId, lastSeq: 0, lastHash: CHAIN_START })
    .onDuplicateKeyUpdate({ set: { chainId } })
  const end = await lockEnd(tx, chainId)
  if (end === undefined) throw new TypeError(`The audit chain ${chainId} cannot be started`)
  return end
}
