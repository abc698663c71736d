import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import {
  createDistinctSet,
  type DistinctSetWire,
  deleteDistinctSet,
  listDistinctSets,
  patchDistinctSet,
} from '#shared/contracts/distinct-sets.contract.ts'
import type { SetDraft } from './set-draft.ts'

export const distinctSetQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'distinct-sets'],
      queryFn: async () => (await call(listDistinctSets, { params: { system } })).body.items,
    }),
}

const said = (message: string) => (message.trim() === '' ? {} : { message })

interface SetWrite {
  readonly system: string
  /** As the person saw it; none where it is made. */
  readonly set: DistinctSetWire | undefined
  readonly message: string
}

/** Makes a set, or writes what a draft changes; answers it and what that did. */
export async function saveSet({ system, set, message, ...draft }: SetWrite & SetDraft) {
  const body = { name: draft.name.trim(), tokens: [...draft.tokens], ...said(message) }
  if (set === undefined) return (await call(createDistinctSet, { params: { system }, body })).body
  const params = { system, id: set.id }
  return (await call(patchDistinctSet, { params, ifMatch: set.etag, body })).body
}

export async function removeSet({ system, set }: { system: string; set: DistinctSetWire }) {
  await call(deleteDistinctSet, { params: { system, id: set.id }, ifMatch: set.etag })
}
