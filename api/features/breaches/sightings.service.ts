import * as z from 'zod'
import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { decodeCursor, encodeCursor } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Repositories } from '#api/repositories.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import { type listSightings, SIGHTING_SORTS } from '#shared/contracts/sightings.contract.ts'
import { inCi, subjectHashOf } from './log-steps.ts'
import {
  type BranchWrites,
  recordBranch,
  type Seen,
  type Watch,
  watchBranch,
} from './record-branch.ts'
import { presentSighting } from './sightings.presenter.ts'
import type { SightingPlace, SightingRow } from './sightings.reads.ts'
import type { Source } from './sightings.rules.ts'

export type { Seen } from './record-branch.ts'

export interface SightingsDeps {
  readonly reads: Pick<Repositories, 'sightings' | 'breaches'>
  readonly newId: NewId
}

type ListQuery = ParsedOf<typeof listSightings>['query']

export type SightingsService = ReturnType<typeof createSightingsService>

const placeSchema = z.strictObject({
  order: z.enum(SIGHTING_SORTS),
  at: z.iso.datetime({ precision: 3 }),
  tie: z.string().length(64),
})

/** What pipelines see: every sighting is counted, and the breach log follows protected branches. */
export const createSightingsService = ({ reads, newId }: SightingsDeps) => ({
  async list(system: SystemAccess, query: ListQuery) {
    const { sort: order, limit, protected: only, cursor: _, ...asked } = query
    const filter = { ...asked, isProtected: only && only === 'true' }
    const page = { order, after: placeIn(query), limit: limit + 1 }
    const [rows, total] = await Promise.all([
      reads.sightings.list(system.id, filter, page),
      reads.sightings.count(system.id, filter),
    ])
    const shown = rows.slice(0, limit)
    const sightings = shown.map(({ sighting }) => sighting)
    const body: AnswerOf<typeof listSightings> = {
      items: await present(reads, system.id, sightings),
      total,
    }
    const last = rows.length > limit ? shown.at(-1) : undefined
    if (last === undefined) return { body }
    const { firstSeenAt, lastSeenAt } = last.sighting
    const at = order === '-last-seen' ? lastSeenAt : firstSeenAt
    return { body, next: encodeCursor({ order, at: at.toISOString(), tie: last.tie }) }
  },

  /** Takes the locks that recording a check needs: call it first in the check's transaction. */
  watch: (writes: BranchWrites, systemId: string, source: Source | undefined) =>
    watchBranch(writes, systemId, source),

  /** Counts what a check saw, and brings the log up to date. Call it after the check's row. */
  record: (writes: BranchWrites, watch: Watch, seen: Seen) =>
    recordBranch(writes, newId, { watch, seen }),
})

/** With the names of now, and the entries that protected branches opened. */
async function present(
  { breaches }: SightingsDeps['reads'],
  systemId: string,
  rows: readonly SightingRow[],
) {
  const hashes = rows.map((row) => subjectHashOf(inCi(row), row.identity))
  const ids = rows.flatMap((row) => [row.foregroundTokenId, row.backgroundTokenId])
  const [names, entries] = await Promise.all([
    breaches.tokenNames(systemId, [...new Set(ids)]),
    breaches.listBySubjects(systemId, hashes),
  ])
  const entryAt = new Map(entries.map((entry) => [entry.subjectHash, entry]))
  return rows.map((row, at) => presentSighting(row, names, entryAt.get(hashes[at] ?? '')))
}

/** A cursor goes on with the order that it began with. */
function placeIn({ cursor, sort }: ListQuery): SightingPlace | undefined {
  const place = decodeCursor(placeSchema, cursor)
  if (place === undefined) return undefined
  if (place.order === sort) return { at: new Date(place.at), tie: place.tie }
  const detail = `It belongs to sort=${place.order}`
  throw new AppError('parameter-invalid', { faults: [{ parameter: 'cursor', detail }] })
}
