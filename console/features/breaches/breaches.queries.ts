import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import {
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
  readonly etag: string
  /** A member's id; `null`: nobody. */
  readonly assignee: string | null
}

/** Says who is on a breach; answers it as it is then. */
export async function assignBreach({ system, id, etag, assignee }: Assignment) {
  const body = { assignee }
  return (await call(patchBreach, { params: { system, id }, ifMatch: etag, body })).body
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
