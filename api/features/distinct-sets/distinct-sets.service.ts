import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadWriteService } from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { DistinctSet } from '#shared/checks/model.ts'
import type { DistinctSetWire } from '#shared/contracts/distinct-sets.contract.ts'
import { presentDistinctSet } from '#shared/contracts/present-items.ts'
import {
  type CreateDistinctSetBody,
  decideCreate,
  decideDelete,
  decidePatch,
  type PatchDistinctSetBody,
} from './distinct-sets.rules.ts'

export interface DistinctSetsDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
  readonly newId: NewId
}

/** An edit of one set, meant for one representation of it. */
export interface SetEdit {
  readonly id: string
  readonly ifMatch: IfMatch
}

/** Reads distinct sets off the head and writes them to it. */
export function createDistinctSetsService({ heads, writes, newId }: DistinctSetsDeps) {
  return {
    async list(system: SystemAccess): Promise<DistinctSetWire[]> {
      const head = await heads.current(system.id)
      return (head.model.distinctSets ?? []).map((set) => taggedSet(head, set))
    },

    async get(system: SystemAccess, id: string): Promise<DistinctSetWire> {
      const head = await heads.current(system.id)
      return taggedSet(head, setOf(head, id))
    },

    async create(system: SystemAccess, body: CreateDistinctSetBody) {
      const id = newId('dst')
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        decide: ({ index }) => decideCreate(index, body, id),
        audit: { action: 'distinct-set.created', subject: id },
      })
      return { ...taggedSet(head, setOf(head, id)), effect }
    },

    async patch(system: SystemAccess, { id, ifMatch }: SetEdit, body: PatchDistinctSetBody) {
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch, current: (now) => taggedSet(now, setOf(now, id)) },
        decide: (now) => decidePatch(now.index, setOf(now, id), body),
        audit: { action: 'distinct-set.edited', subject: id },
      })
      return { ...taggedSet(head, setOf(head, id)), effect }
    },

    async remove(
      system: SystemAccess,
      { id, ifMatch }: SetEdit,
      message: string | undefined,
    ): Promise<void> {
      await writes.write({
        system,
        message,
        expected: { ifMatch, current: (now) => taggedSet(now, setOf(now, id)) },
        decide: (now) => decideDelete(setOf(now, id)),
        audit: { action: 'distinct-set.deleted', subject: id },
      })
    },
  }
}
export type DistinctSetsService = ReturnType<typeof createDistinctSetsService>

function setOf({ model }: Head, id: string): DistinctSet {
  const set = model.distinctSets?.find((one) => one.id === id)
  if (set === undefined) throw new AppError('not-found', { detail: `No distinct set ${id}` })
  return set
}

function taggedSet({ index }: Head, set: DistinctSet): DistinctSetWire {
  const wire = presentDistinctSet(set, index.names)
  return { ...wire, etag: etagOf(wire) }
}
