import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { setTimeout as pause } from 'node:timers/promises'
import { sql } from 'drizzle-orm'
import type { RowDataPacket } from 'mysql2/promise'
import { compose } from '#api/compose.ts'
import { readConfig } from '#api/config.ts'
import { WRITE_GUARDS, type WriteGuards } from '#api/features/revisions/write-guards.ts'
import {
  createDatabase,
  createTransact,
  type Database,
  type Executor,
} from '#api/platform/database.ts'
import { enclose } from '#api/platform/enclosing-transaction.ts'
import {
  IDEMPOTENCY_GUARDS,
  type IdempotencyGuards,
} from '#api/platform/idempotency/idempotency-guards.ts'
import { createRateCounter, type RateCounter } from '#api/platform/rate-limit/rate-counter.ts'

/**
 * One API process for the races: the service as it is, and beside it, each at a port of its own, mutants of
 * its write, of its keys and of its rate counter. Every variant is held up a little while it takes the lock, so that races overlap.
 */
export const VARIANTS = [
  'sound',
  'no-version-compare',
  'no-lock',
  'stale-snapshot',
  'no-key-lock',
  'record-apart',
  'two-statements',
  'own-memory',
] as const
export type Variant = (typeof VARIANTS)[number]

/** What the process tells its parent: first where the variants listen, then each overlap of the
 * sound one, and each effect whose record is not written yet. */
export type RaceMessage =
  | { readonly ports: Record<Variant, number> }
  | { readonly overlap: true }
  | { readonly unrecorded: true }

const PAUSE_MS = 3

const SOUND: WriteGuards = {
  lock: async (heads, systemId) => {
    await pause(PAUSE_MS)
    return WRITE_GUARDS.lock(heads, systemId)
  },
  isCurrent: (decidedOn, locked) => {
    const current = WRITE_GUARDS.isCurrent(decidedOn, locked)
    if (!current) tell({ overlap: true })
    return current
  },
  isMeantFor: WRITE_GUARDS.isMeantFor,
}

const GUARDS: Partial<Record<Variant, WriteGuards>> = {
  'no-version-compare': {
    lock: async (heads, systemId) => {
      await pause(PAUSE_MS)
      return WRITE_GUARDS.lock(heads, systemId)
    },
    isCurrent: () => true,
    isMeantFor: () => true,
  },
  'no-lock': {
    ...WRITE_GUARDS,
    lock: async (heads, systemId) => {
      const mark = await heads.peek(systemId)
      await pause(PAUSE_MS)
      return mark && { ...mark, at: new Date() }
    },
  },
  'stale-snapshot': {
    ...WRITE_GUARDS,
    lock: async (heads, systemId) => {
      await pause(PAUSE_MS)
      return WRITE_GUARDS.lock(heads, systemId)
    },
  },
}

const UNRECORDED_MS = 15

/** An effect waits for its record, so that its repetitions meet it running and a kill meets it half done. */
async function holdUnrecorded(): Promise<void> {
  tell({ unrecorded: true })
  await pause(UNRECORDED_MS)
}

const SOUND_KEYS: IdempotencyGuards = {
  ...IDEMPOTENCY_GUARDS,
  together: async (run, effect, record) =>
    IDEMPOTENCY_GUARDS.together(run, effect, async (tx, produced) => {
      await holdUnrecorded()
      await record(tx, produced)
    }),
}

const KEY_GUARDS: Partial<Record<Variant, IdempotencyGuards>> = {
  'no-key-lock': { ...SOUND_KEYS, lock: async () => true },
  'record-apart': {
    ...SOUND_KEYS,
    together: async (run, effect, record) => {
      const produced = await enclose(run, effect)
      await holdUnrecorded()
      await run((tx) => record(tx, produced))
      return produced
    },
  },
}

/** So long that the other process counts in between. */
const APART_MS = 15

const RATE_COUNTERS: Partial<Record<Variant, (database: Database) => RateCounter>> = {
  'two-statements': ({ pool }) => ({
    add: async (bucket, hits, windowMs) => {
      const [[row]] = await pool.query<(RowDataPacket & { hits: number })[]>(
        'select hits from rate_counters where bucket = ?',
        [bucket],
      )
      await pause(APART_MS)
      const counted = (row?.hits ?? 0) + hits
      await pool.query(
        `insert into rate_counters (bucket, hits, window_ends_at)
           values (?, ?, utc_timestamp(3) + interval 1 hour) on duplicate key update hits = ?`,
        [bucket, counted, counted],
      )
      return { hits: counted, remainingMs: windowMs }
    },
  }),
  'own-memory': () => {
    const counts = new Map<string, number>()
    return {
      add: async (bucket, hits, windowMs) => {
        counts.set(bucket, (counts.get(bucket) ?? 0) + hits)
        return { hits: counts.get(bucket) ?? 0, remainingMs: windowMs }
      },
    }
  },
}

/** A plain read before the lock, in the isolation level that keeps what it saw. */
function staleTransact(db: Executor): ReturnType<typeof createTransact> {
  const transact = createTransact(db, 'repeatable read')
  return (work) =>
    transact(async (tx) => {
      await tx.execute(sql`select count(*) from system_heads`)
      return work(tx)
    })
}

function tell(message: RaceMessage): void {
  process.send?.(message)
}

function serve(variant: Variant): Promise<number> {
  const read = readConfig({ ...process.env, PORT: '0' })
  if (!read.ok) throw new TypeError(read.refusals.join('; '))
  const { config } = read
  const database = createDatabase({ url: config.databaseUrl, connections: 6 })
  const { app } = compose({
    config,
    platform: {
      database,
      writeGuards: GUARDS[variant] ?? SOUND,
      idempotencyGuards: KEY_GUARDS[variant] ?? SOUND_KEYS,
      rateCounter: RATE_COUNTERS[variant]?.(database) ?? createRateCounter(database),
      ...(variant === 'stale-snapshot' ? { transact: staleTransact(database.db) } : {}),
    },
  })
  const server = createServer(app)
  return new Promise((resolve) => {
    server.listen(0, '127.0.0.1', () => resolve((server.address() as AddressInfo).port))
  })
}

process.on('disconnect', () => process.exit())
if (process.send) {
  const ports = await Promise.all(VARIANTS.map(async (variant) => [variant, await serve(variant)]))
  tell({ ports: Object.fromEntries(ports) })
}
