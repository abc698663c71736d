import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query'
import { call, isRefusal } from '#console/lib/api.ts'
import {
  type BreachWire,
  createBreachComment,
  getBreach,
  listBreaches,
  patchBreach,
} from '#shared/contracts/breaches.contract.ts'
import { type BreachFilter, queryOfFilter } from './breach-filter.ts'

export const breachQueries = {
  list: (system: string, filter: BreachFilter) =>
    infiniteQueryOptions({
      queryKey: ['system', system, 'breaches', filter],
      queryFn: ({ pageParam }) =>
        call(listBreaches, {
          params: { system },
          query: { ...queryOfFilter(filter), cursor: pageParam },
        }),
      initialPageParam: undefined as string | undefined,
      getNextPageParam: (page) => page.next,
    }),
  one: (system: string, id: string) =>
    queryOptions({
      queryKey: ['system', system, 'breach', id],
      queryFn: async () => (await call(getBreach, { params: { system, id } })).body,
    }),
}

export interface Assignment {
  readonly system: string
  readonly id: string
  /** The breach as it was seen. */
  readonly seen: BreachWire
  /** A member's id; `null`: nobody. */
  readonly assignee: string | null
}

/**
 * Says who is on a breach; answers it as it is then. What came to its history meanwhile, such as a comment, is no
 * reason to ask again; somebody else's assignment is.
 */
export async function assignBreach({ system, id, seen, assignee }: Assignment) {
  const write = async (etag: string) =>
    (await call(patchBreach, { params: { system, id }, ifMatch: etag, body: { assignee } })).body
  try {
    return await write(seen.etag)
  } catch (error) {
    if (!isRefusal(error, 412)) throw error
    const now = (await call(getBreach, { params: { system, id } })).body
    if (now.assignee?.id !== seen.assignee?.id) throw error
    return await write(now.etag)
  }
}

export interface NewComment {
  readonly system: string
  readonly id: string
  readonly text: string
  /** The same for every try of one comment, so that it is added once. */
  readonly idempotencyKey: string
}

export async function addComment({ system, id, text, idempotencyKey }: NewComment) {
  const body = { body: text }
  return (await call(createBreachComment, { params: { system, id }, body, idempotencyKey })).body
}
