import { useSuspenseQuery } from '@tanstack/react-query'
import { memberQueries } from '#console/features/members/members.queries.ts'
import type { Role } from '#shared/contracts/permissions.ts'
import { useMe } from './account-items.tsx'

/** Who the person is in a system, and who else may do what they may not. */
export function useWhoMay(system: string) {
  const me = useMe()
  const { data: members } = useSuspenseQuery(memberQueries.all(system))
  const role = me.user.admin ? ('admin' as const) : me.roles[system]
  return {
    role,
    is: (...roles: readonly Role[]) =>
      role === 'admin' || (role !== undefined && roles.includes(role)),
    /** ` Ines Marrow is one.`, or nothing where there is nobody. */
    oneOf: (wanted: Role) => {
      const found = members.find((member) => member.role === wanted)
      return found === undefined ? '' : ` ${found.name} is one.`
    },
  }
}
