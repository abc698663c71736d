import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { listMembers, putMembers } from '#shared/contracts/members.contract.ts'
import type { Role } from '#shared/contracts/permissions.ts'

const list = (system: string) =>
  ({
    queryKey: ['system', system, 'members'],
    queryFn: async () => (await call(listMembers, { params: { system } })).body,
  }) as const

export const memberQueries = {
  /** The list with its validator. */
  list: (system: string) => queryOptions(list(system)),
  all: (system: string) => queryOptions({ ...list(system), select: ({ items }) => items }),
}

export interface MembersWrite {
  readonly system: string
  readonly etag: string
  readonly items: readonly { readonly email: string; readonly role: Role }[]
}

/** Replaces the list of members; answers it as it is then. */
export async function saveMembers({ system, etag, items }: MembersWrite) {
  const body = { items: items.map(({ email, role }) => ({ email, role })) }
  return (await call(putMembers, { params: { system }, ifMatch: etag, body })).body
}
