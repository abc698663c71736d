import { and, eq, inArray, ne, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { breachEvents, breaches } from '#drizzle/schema/breaches.ts'
import { systemHeads } from '#drizzle/schema/systems.ts'

export type BreachRow = typeof breaches.$inferSelect
export type NewBreachRow = typeof breaches.$inferInsert
export type NewBreachEventRow = typeof breachEvents.$inferInsert

export type BreachesRepository = ReturnType<typeof createBreachesRepository>

/** Rows a statement: far below the packet limit with the widest of them. */
const CHUNK = 500

/** Writes the breach log. The caller holds the system's head lock, so numbers are taken without a gap. */
export function createBreachesRepository(db: Executor) {
  return {
    async listBySubjects(systemId: string, hashes: readonly string[]): Promise<BreachRow[]> {
      const rows: BreachRow[] = []
      for (const chunk of chunksOf(hashes)) {
        const found = and(eq(breaches.systemId, systemId), inArray(breaches.subjectHash, chunk))
        rows.push(...(await db.select().from(breaches).where(found)))
      }
      return rows
    },

    /** What the log holds against one place and has not closed. */
    listUnresolved(
      systemId: string,
      { origin, repository, branch }: Pick<BreachRow, 'origin' | 'repository' | 'branch'>,
    ): Promise<BreachRow[]> {
      return db
        .select()
        .from(breaches)
        .where(
          and(
            eq(breaches.systemId, systemId),
            ne(breaches.status, 'resolved'),
            eq(breaches.origin, origin),
            eq(breaches.repository, repository),
            eq(breaches.branch, branch),
          ),
        )
    },

    /** Held until the transaction ends: nobody handles one entry at the same time as another. */
    async lock(systemId: string, id: string): Promise<void> {
      await db
        .select({ id: breaches.id })
        .from(breaches)
        .where(and(eq(breaches.systemId, systemId), eq(breaches.id, id)))
        .for('update')
    },

    /** A new version: another assignee, or a history that has grown. */
    async touch(id: string, handling: Partial<Pick<BreachRow, 'assigneeUserId'>> = {}) {
      const moved = { ...handling, version: NEXT_VERSION }
      await db.update(breaches).set(moved).where(eq(breaches.id, id))
    },

    /** Takes `count` consecutive numbers; answers the first. */
    async takeNumbers(systemId: string, count: number): Promise<number> {
      const ofSystem = eq(systemHeads.systemId, systemId)
      const [head] = await db
        .select({ next: systemHeads.nextBreachNumber })
        .from(systemHeads)
        .where(ofSystem)
      if (head === undefined) throw new TypeError(`System ${systemId} has no head`)
      await db
        .update(systemHeads)
        .set({ nextBreachNumber: head.next + count })
        .where(ofSystem)
      return head.next
    },

    /** Inserts new entries and brings the others up to date, each in its turn with a new version. */
    async save(rows: readonly NewBreachRow[]): Promise<void> {
      for (const chunk of chunksOf(rows)) {
        await db.insert(breaches).values(chunk).onDuplicateKeyUpdate({ set: MOVING_COLUMNS })
      }
    },

    async addEvents(rows: readonly NewBreachEventRow[]): Promise<void> {
      for (const chunk of chunksOf(rows)) await db.insert(breachEvents).values(chunk)
    },
  }
}

const NEXT_VERSION = sql`${sql.identifier(breaches.version.name)} + 1`

const incoming = (column: { readonly name: string }) => sql`values(${sql.identifier(column.name)})`

const MOVING_COLUMNS = {
  ...Object.fromEntries(
    (
      [
        'status',
        'names',
        'use',
        'gating',
        'basis',
        'ratio',
        'required',
        'lowestRatio',
        'foregroundHex',
        'backgroundHex',
        'waiverId',
        'lastSeenAt',
        'resolvedAt',
        'closingReason',
        'metBy',
      ] as const
    ).map((name) => [name, incoming(breaches[name])]),
  ),
  version: NEXT_VERSION,
}

function chunksOf<Item>(items: readonly Item[]): Item[][] {
  const chunks: Item[][] = []
  for (let from = 0; from < items.length; from += CHUNK)
    chunks.push(items.slice(from, from + CHUNK))
  return chunks
}
