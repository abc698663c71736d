import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AuditActor } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { findTampering, type SealedEntry } from '#api/platform/audit/audit-chain.ts'
import { createDatabase, type Database, type Executor } from '#api/platform/database.ts'
import { isDuplicate } from '#api/platform/database-error.ts'
import { createTransactOver } from '#api/repositories.ts'
import { createTestDatabase, type TestDatabase } from '#tests/support/database.ts'

let own: TestDatabase
let database: Database
/** Another process's pool. */
let other: Database

beforeAll(async () => {
  own = await createTestDatabase()
  database = createDatabase({ url: own.serveUrl })
  other = createDatabase({ url: own.serveUrl })
  await bucket('a')
  await bucket('b')
})
afterAll(async () => {
  await database.close()
  await other.close()
  await own.drop()
})

const bucket = (name: string) =>
  database.db.execute(sql`insert into rate_counters values (${name}, 0, utc_timestamp(3))`)
const add = (tx: Executor, name: string) =>
  tx.execute(sql`update rate_counters set hits = hits + 1 where bucket = ${name}`)
const hitsOf = async (name: string): Promise<number> => {
  const [rows] = await database.pool.query<never[]>(
    'select hits from rate_counters where bucket = ?',
    [name],
  )
  return (rows as { hits: number }[])[0]?.hits ?? -1
}

/** Two that each hold what the other wants next, over and over. */
async function deadlock(rounds: number): Promise<{ attempts: number }> {
  let attempts = 0
  const both = (of: Database, first: string, second: string) =>
    of.transact(async (tx) => {
      attempts += 1
      await add(tx, first)
      await new Promise((resolve) => setTimeout(resolve, 15))
      await add(tx, second)
    })
  for (let round = 0; round < rounds; round += 1) {
    await Promise.all([both(database, 'a', 'b'), both(other, 'b', 'a')])
  }
  return { attempts }
}

describe('a transaction', () => {
  it('runs again as a whole where the database gave it up', async () => {
    const before = (await hitsOf('a')) + (await hitsOf('b'))
    const { attempts } = await deadlock(10)
    // Deadlocks did happen, and each transaction still counted both once.
    expect(attempts).toBeGreaterThan(20)
    expect((await hitsOf('a')) + (await hitsOf('b'))).toBe(before + 40)
  })

  it('gives up after four attempts with service-unavailable', async () => {
    let attempts = 0
    const run = database.transact(async (tx) => {
      attempts += 1
      await tx.execute(sql`signal sqlstate '40001' set mysql_errno = 1213`)
    })
    await expect(run).rejects.toMatchObject({ code: 'service-unavailable' })
    expect(attempts).toBe(4)
  })

  it('leaves a refusal as it is, runs it once, and rolls back', async () => {
    const before = await hitsOf('a')
    let attempts = 0
    const run = database.transact(async (tx) => {
      attempts += 1
      await add(tx, 'a')
      throw new AppError('token-in-use')
    })
    await expect(run).rejects.toMatchObject({ code: 'token-in-use' })
    expect(attempts).toBe(1)
    expect(await hitsOf('a')).toBe(before)
  })

  it('reads what others committed since it began', async () => {
    const seen = await database.transact(async (tx) => {
      const count = async () => {
        const [rows] = (await tx.execute(
          sql`select hits from rate_counters where bucket = 'b'`,
        )) as unknown as [{ hits: number }[]]
        return rows[0]?.hits ?? -1
      }
      const first = await count()
      await add(other.db, 'b')
      return [first, await count()]
    })
    expect(seen[1]).toBe(Number(seen[0]) + 1)
  })

  it('names the unique key that refused, and none of the values', async () => {
    const failure = await database
      .transact((tx) =>
        tx.execute(sql`insert into rate_counters values ('a', 7654321, utc_timestamp(3))`),
      )
      .catch((error: Error) => error)
    expect(isDuplicate(failure)).toBe(true)
    expect(isDuplicate(failure, 'PRIMARY')).toBe(true)
    expect(isDuplicate(failure, 'users_email_uq')).toBe(false)
    expect(String(failure)).toContain('DatabaseError')
  })
})

describe('the audit chain', () => {
  const actor: AuditActor = { kind: 'user', id: 'usr_1' }
  const readChain = async (chain: string): Promise<SealedEntry[]> => {
    const [rows] = await database.pool.query<never[]>(
      `select chain_id as chainId, seq, at, actor_kind as kind, actor_id as id, action, subject, details,
              previous_hash as previousHash, hash from audit_entries where chain_id = ? order by seq`,
      [chain],
    )
    return (rows as (SealedEntry & AuditActor)[]).map(({ kind, id, ...entry }) => ({
      ...entry,
      actor: { kind, id },
    }))
  }

  it('stays whole and without a gap while two processes write to it at once', async () => {
    const append = (of: Database, round: number) =>
      createTransactOver(of.transact)(({ audit }) =>
        audit.append({
          chain: 'sys_race',
          actor,
          action: 'thing.done',
          subject: `thing_${round}`,
          details: { z: 1, a: { round, text: 'é"\\' } },
        }),
      )
    const rounds = Array.from({ length: 25 }, (_, round) => round)
    await Promise.all(rounds.flatMap((round) => [append(database, round), append(other, round)]))
    const chain = await readChain('sys_race')
    expect(chain).toHaveLength(50)
    expect(findTampering(chain)).toBeUndefined()
  })

  it('leaves no entry of a transaction that was rolled back', async () => {
    await createTransactOver(database.transact)(async ({ audit }) => {
      await audit.append({ chain: 'sys_race', actor, action: 'thing.undone', subject: 'x' })
      throw new AppError('token-in-use')
    }).catch(() => {})
    const chain = await readChain('sys_race')
    expect(chain).toHaveLength(50)
    const [rows] = await database.pool.query<never[]>(
      `select last_seq as seq, last_hash as hash from audit_chains where chain_id = 'sys_race'`,
    )
    expect(rows[0]).toEqual({ seq: 50, hash: chain.at(-1)?.hash })
  })
})
