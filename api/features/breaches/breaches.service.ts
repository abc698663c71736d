import * as z from 'zod'
import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { decodeCursor, encodeCursor } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf } from '#api/precondition.ts'
import type { BreachWire, getBreach, listBreaches } from '#shared/contracts/breaches.contract.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import { presentBreach, presentEvents } from './breaches.presenter.ts'
import type { BreachesReads, BreachFilter, ListedBreach } from './breaches.reads.ts'
import { type HeadMove, type LogWrites, recordMove } from './record-move.ts'

export interface BreachesOptions {
  readonly reads: BreachesReads
  readonly newId: NewId
}

export type BreachesService = ReturnType<typeof createBreachesService>
type ListQuery = ParsedOf<typeof listBreaches>['query']

const placeSchema = z.strictObject({ reached: z.number(), number: z.int().min(0) })

/** The breach log: read by everyone in a system, written by the one write of its head. */
export function createBreachesService({ reads, newId }: BreachesOptions) {
  async function present(systemId: string, rows: readonly ListedBreach[]): Promise<BreachWire[]> {
    const ids = rows.flatMap(({ breach }) => [breach.foregroundTokenId, breach.backgroundTokenId])
    const names = await reads.tokenNames(systemId, [...new Set(ids)])
    return rows.map((row) => {
      const breach = presentBreach(row, names)
      return { ...breach, etag: etagOf({ ...breach, version: row.breach.version }) }
    })
  }

  return {
    async list(system: SystemAccess, query: ListQuery) {
      const { sort, limit, cursor } = query
      const filter = filterOf(query)
      const after = decodeCursor(placeSchema, cursor)
      const [rows, total, ever] = await Promise.all([
        reads.list(system.id, filter, { order: sort, after, limit: limit + 1 }),
        reads.count(system.id, filter),
        reads.countEver(system.id),
      ])
      const shown = rows.slice(0, limit)
      const body: AnswerOf<typeof listBreaches> = {
        items: await present(system.id, shown),
        total,
        ever,
      }
      const last = rows.length > limit ? shown.at(-1) : undefined
      return last === undefined ? { body } : { body, next: encodeCursor(placeOf(last)) }
    },

    async get(system: SystemAccess, id: string): Promise<AnswerOf<typeof getBreach>> {
      const row = await reads.find(system.id, id)
      if (row === undefined) throw new AppError('not-found', { detail: `No breach ${id}` })
      const [[breach], events] = await Promise.all([
        present(system.id, [row]),
        reads.listEvents(id),
      ])
      if (breach === undefined) throw new TypeError('One row presents as one breach')
      return { ...breach, events: presentEvents(events) }
    },

    /**
     * Writes what a move of the head does to the log. Call it inside the write's transaction, under the
     * head's lock, after the revision's row.
     */
    recordHead: (repositories: LogWrites, move: HeadMove) =>
      recordMove(repositories.breaches, { newId, move }),
  }
}

function filterOf(query: ListQuery): BreachFilter {
  const { theme, token, kind, origin } = query
  const statuses = query.status?.length ? query.status : (['open', 'waived'] as const)
  return { statuses, theme, token, kind, origin }
}

const placeOf = ({ breach, reached }: ListedBreach) => ({ reached, number: breach.number })
