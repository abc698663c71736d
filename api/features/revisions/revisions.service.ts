import * as z from 'zod'
import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { decodeCursor, encodeCursor } from '#api/paging.ts'
import { indexSystem } from '#shared/contracts/governed-system.ts'
import type { getRevision, listRevisions } from '#shared/contracts/revisions.contract.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import { editsOf } from './revision-edits.rules.ts'
import { presentRevision, presentRevisionSummary } from './revisions.presenter.ts'
import type { RevisionsReads } from './revisions.reads.ts'
import type { VersionsReads } from './versions.reads.ts'

export interface RevisionsDeps {
  readonly reads: RevisionsReads
  readonly versions: Pick<VersionsReads, 'systemAt'>
}

export type RevisionsService = ReturnType<typeof createRevisionsService>

const placeSchema = z.strictObject({ number: z.int().min(0) })

/** Reads back what the one write wrote: every revision, whole, for ever. */
export function createRevisionsService({ reads, versions }: RevisionsDeps) {
  return {
    async list({ id }: SystemAccess, { limit, cursor }: ParsedOf<typeof listRevisions>['query']) {
      const before = decodeCursor(placeSchema, cursor)?.number
      const rows = await reads.list(id, { before, limit: limit + 1 })
      const shown = rows.slice(0, limit)
      const body: AnswerOf<typeof listRevisions> = { items: shown.map(presentRevisionSummary) }
      const last = rows.length > limit ? shown.at(-1) : undefined
      return last === undefined
        ? { body }
        : { body, next: encodeCursor({ number: last.revision.number }) }
    },

    async get({ id }: SystemAccess, number: number): Promise<AnswerOf<typeof getRevision>> {
      const row = await reads.find(id, number)
      if (row === undefined) throw new AppError('not-found', { detail: `No revision ${number}` })
      const [model, touched] = await Promise.all([
        versions.systemAt(id, number),
        reads.versionsTouched(id, number),
      ])
      const index = indexSystem(model)
      return presentRevision(row, index, editsOf(touched, number, index.names))
    },
  }
}
