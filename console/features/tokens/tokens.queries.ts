import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { everyItem } from '#console/lib/every-item.ts'
import type { Answer } from '#shared/client/client.ts'
import {
  getToken,
  type LedgerTokenWire,
  listTokens,
  patchToken,
  type StripTokenWire,
} from '#shared/contracts/tokens.contract.ts'

/** One page of the list; which shape its items have follows from the view that was asked for. */
function readPage<Item>(system: string, view: 'full' | 'ledger', cursor: string | undefined) {
  return call(listTokens, {
    params: { system },
    query: { view, limit: 500, cursor },
  }) as Promise<Answer<{ items: Item[] }>>
}

export const tokenQueries = {
  /** Every token in ledger order with its standing. */
  ledger: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'tokens'],
      queryFn: () => everyItem<LedgerTokenWire>((cursor) => readPage(system, 'full', cursor)),
    }),
  /** Names, two colours and marks: what the strip shows. */
  strip: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'strip'],
      queryFn: () => everyItem<StripTokenWire>((cursor) => readPage(system, 'ledger', cursor)),
    }),
  one: (system: string, name: string) =>
    queryOptions({
      queryKey: ['system', system, 'token', name],
      queryFn: async () => (await call(getToken, { params: { system, name } })).body,
    }),
}

export interface TokenEdit {
  readonly system: string
  readonly name: string
  /** Validator of what the person saw. */
  readonly etag: string
  readonly value: string
  readonly message: string
}

/** Writes a value straight to the head; answers the token and what that did. */
export async function saveToken({ system, name, etag, value, message }: TokenEdit) {
  const body = { value, ...(message.trim() === '' ? {} : { message }) }
  return (await call(patchToken, { params: { system, name }, ifMatch: etag, body })).body
}
