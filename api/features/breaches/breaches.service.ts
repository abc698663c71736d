import * as z from 'zod'
import type { Caller, SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { decodeCursor, encodeCursor } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import { BREACH_SORTS, type BreachFilterQuery } from '#shared/contracts/breach-filter.ts'
import type { BreachWire, getBreach, listBreaches } from '#shared/contracts/breaches.contract.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import { breachAnswers, wholeBreach } from './breach-answers.ts'
import type { BreachFilter } from './breach-matches.reads.ts'
import type { BreachPlace } from './breach-order.reads.ts'
import type { BreachesReads, ListedBreach } from './breaches.reads.ts'
import { breachTable } from './breach-table.presenter.ts'
import { type HeadMove, type LogWrites, recordMove } from './record-move.ts'

export interface BreachesOptions {
  readonly reads: BreachesReads
  readonly newId: NewId
}

export type BreachesService = ReturnType<typeof createBreachesService>
type ListQuery = ParsedOf<typeof listBreaches>['query']

const placeSchema = z.strictObject({
  order: z.enum(BREACH_SORTS),
  value: z.number(),
  number: z.int().min(0),
})

/** Rows a statement, where the whole log is read. */
const EXPORT_ROWS = 2_000

/** The breach log: read by everyone in a system, written by checks: those of its head, and those of pipelines. */
export function createBreachesService({ reads, newId }: BreachesOptions) {
  return {
    async list(system: SystemAccess, query: ListQuery) {
      const { sort, limit } = query
      const filter = filterOf(query, system.caller)
      const [rows, total, ever] = await Promise.all([
        reads.list(system.id, filter, { order: sort, after: placeIn(query), limit: limit + 1 }),
        reads.count(system.id, filter),
        reads.countEver(system.id),
      ])
      const shown = rows.slice(0, limit)
      const body: AnswerOf<typeof listBreaches> = {
        items: await breachAnswers(reads, system.id, shown),
        total,
        ever,
      }
      const last = rows.length > limit ? shown.at(-1) : undefined
      if (last === undefined) return { body }
      return { body, next: encodeCursor({ order: sort, ...placeOf(last) }) }
    },

    /** The same entries as the list, all of them, as a table. */
    async table(system: SystemAccess, query: BreachFilterQuery): Promise<string> {
      const filter = filterOf(query, system.caller)
      const entries: BreachWire[] = []
      let after: BreachPlace | undefined
      do {
        const page = { order: query.sort, after, limit: EXPORT_ROWS }
        const rows = await reads.list(system.id, filter, page)
        entries.push(...(await breachAnswers(reads, system.id, rows)))
        const last = rows.length === EXPORT_ROWS ? rows.at(-1) : undefined
        after = last && placeOf(last)
      } while (after !== undefined)
      return breachTable(entries)
    },

    async get(system: SystemAccess, id: string): Promise<AnswerOf<typeof getBreach>> {
      const breach = await wholeBreach(reads, system.id, id)
      if (breach === undefined) throw new AppError('not-found', { detail: `No breach ${id}` })
      return breach
    },

    /**
     * Writes what a move of the head does to the log. Call it inside the write's transaction, under the
     * head's lock, after the revision's row.
     */
    recordHead: (repositories: LogWrites, move: HeadMove) =>
      recordMove(repositories.breaches, { newId, move }),
  }
}

function filterOf(query: BreachFilterQuery, { userId }: Caller): BreachFilter {
  const { status, assignee, ...filter } = query
  return {
    ...filter,
    statuses: status?.length ? status : ['open', 'waived'],
    assignee: assignee === 'none' ? null : assignee === 'me' ? userId : assignee,
  }
}

/** A cursor goes on with the order that it began with. */
function placeIn({ cursor, sort }: ListQuery): BreachPlace | undefined {
  const place = decodeCursor(placeSchema, cursor)
  if (place === undefined || place.order === sort) return place
  const detail = `It belongs to sort=${place.order}`
  throw new AppError('parameter-invalid', { faults: [{ parameter: 'cursor', detail }] })
}

const placeOf = ({ breach, orderedBy }: ListedBreach): BreachPlace => ({
  value: orderedBy,
  number: breach.number,
})
