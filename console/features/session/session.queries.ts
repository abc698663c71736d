import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { getMe, type MeWire, signIn, signOut } from '#shared/contracts/sessions.contract.ts'
import { ROLE_PERMISSIONS, type Permission } from '#shared/contracts/permissions.ts'

export const sessionQueries = {
  me: () =>
    queryOptions({
      queryKey: ['me'],
      queryFn: async () => (await call(getMe, {})).body,
      staleTime: 60_000,
    }),
}

export async function startSession(credentials: { email: string; password: string }) {
  return (await call(signIn, { body: credentials })).body
}

export async function endSession() {
  await call(signOut, {})
}

/** Whether the person may do it in that system; the service decides in the end. */
export function mayDo(me: MeWire, system: string, permission: Permission): boolean {
  const role = me.roles[system]
  const held: readonly string[] = role === undefined ? [] : ROLE_PERMISSIONS[role]
  return me.user.admin || held.includes(permission)
}

/** The person's role there, in words. */
export function roleIn(me: MeWire, system: string): string | undefined {
  const role = me.roles[system] ?? (me.user.admin ? 'admin' : undefined)
  return role?.replace('-', ' ')
}
