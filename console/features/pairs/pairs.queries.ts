import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { everyItem } from '#console/lib/every-item.ts'
import {
  createPair,
  deletePair,
  listPairs,
  type PairInput,
  patchPair,
} from '#shared/contracts/pairs.contract.ts'
import { type PairDraft, patchOf } from './pair-draft.ts'

export const pairQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'pairs'],
      queryFn: () =>
        everyItem((cursor) =>
          call(listPairs, { params: { system }, query: { limit: 500, cursor } }),
        ),
    }),
}

const said = (message: string) => (message.trim() === '' ? {} : { message })

interface PairWrite {
  readonly system: string
  readonly message: string
}

/** Declares a pair; answers it and what that did. */
export async function declarePair({
  system,
  input,
  message,
}: PairWrite & { readonly input: PairInput }) {
  return (await call(createPair, { params: { system }, body: { ...input, ...said(message) } })).body
}

interface StandingPair extends PairWrite {
  readonly id: string
  /** Validator of what the person saw. */
  readonly etag: string
}

/** Writes what a draft changes; answers the pair and what that did. */
export async function savePair({
  system,
  id,
  etag,
  draft,
  input,
  message,
}: StandingPair & { readonly draft: PairDraft; readonly input: PairInput }) {
  return (
    await call(patchPair, {
      params: { system, id },
      ifMatch: etag,
      body: { ...patchOf(draft, input), ...said(message) },
    })
  ).body
}

export async function removePair({ system, id, etag, message }: StandingPair): Promise<void> {
  await call(deletePair, { params: { system, id }, ifMatch: etag, query: said(message) })
}
