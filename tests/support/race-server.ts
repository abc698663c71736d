import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { setTimeout as pause } from 'node:timers/promises'
import { sql } from 'drizzle-orm'
import { compose } from '#api/compose.ts'
import { readConfig } from '#api/config.ts'
import { WRITE_GUARDS, type WriteGuards } from '#api/features/revisions/write-guards.ts'
import { createDatabase, createTransact, type Executor } from '#api/platform/database.ts'

/**
 * One API process for the races: the service as it is, and beside it, each at a port of its own, mutants of
 * its write. Every variant is held up a little while it takes the lock, so that races overlap.
 */
export const VARIANTS = ['sound', 'no-version-compare', 'no-lock', 'stale-snapshot'] as const
export type Variant = (typeof VARIANTS)[number]

/** What the process tells its parent: first where the variants listen, then each overlap of the sound one. */
export type RaceMessage = { readonly ports: Record<Variant, number> } | { readonly overlap: true }

const PAUSE_MS = 3

const GUARDS: Record<Variant, WriteGuards> = {
  sound: {
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
  },
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
      writeGuards: GUARDS[variant],
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
