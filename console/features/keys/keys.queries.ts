import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { createKey, deleteKey, listKeys } from '#shared/contracts/keys.contract.ts'
import type { Scope } from '#shared/contracts/permissions.ts'

export const keyQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'keys'],
      queryFn: async () => (await call(listKeys, { params: { system } })).body.items,
    }),
}

export interface WantedKey {
  readonly name: string
  readonly scopes: readonly Scope[]
  readonly days: number
}

/** Makes a key; the answer holds it, this once. */
export async function makeKey({ system, ...body }: WantedKey & { readonly system: string }) {
  const { scopes, ...rest } = body
  return (await call(createKey, { params: { system }, body: { ...rest, scopes: [...scopes] } }))
    .body
}

export async function revokeKey({ system, id }: { readonly system: string; readonly id: string }) {
  await call(deleteKey, { params: { system, id } })
}
