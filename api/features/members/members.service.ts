import { actorOf, type Caller, createSystemAccess, type SystemAccess } from '#api/caller.ts'
import { invalidRequest } from '#api/errors.ts'
import { etagOf, type IfMatch, preconditionFailed } from '#api/precondition.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import { normalizeEmail } from '#shared/contracts/email-address.ts'
import type { MemberRow } from './members.reads.ts'
import { memberFaults, membershipMoves, type WantedMember } from './members.rules.ts'

export interface MembersDependencies {
  readonly transact: Transact<'members' | 'audit'>
  readonly reads: Pick<Repositories, 'members'>
}

export type MembersService = ReturnType<typeof createMembersService>

function present(rows: readonly MemberRow[]) {
  const items = rows.map((row) => ({ ...row, since: row.since.toISOString() }))
  return { items, etag: etagOf(items) }
}

export const createMembersService = ({ transact, reads }: MembersDependencies) => ({
  /** What a caller may do in a system; nothing where they may not know of it. */
  findAccess: async (caller: Caller, systemKey: string): Promise<SystemAccess | undefined> => {
    const row = await reads.members.findStanding(systemKey, caller.userId)
    if (row === undefined) return undefined
    if (caller.kind === 'key' && caller.systemId !== row.id) return undefined
    const role = row.isAdmin ? 'admin' : row.role
    return role === null ? undefined : createSystemAccess(caller, row, role)
  },

  list: async (system: SystemAccess) => present(await reads.members.list(system.id)),

  replace: (system: SystemAccess, wanted: readonly WantedMember[], ifMatch: IfMatch) =>
    transact(async ({ members, audit }) => {
      await members.lock(system.id)
      const before = await members.list(system.id)
      const current = present(before)
      if (!ifMatch.matches(current.etag)) throw preconditionFailed(current)
      const after = await membersOf(members, wanted)
      const moves = membershipMoves(before, after)
      if (moves.length === 0) return current
      await members.apply(system.id, moves)
      const answer = present(await members.list(system.id))
      await audit.append({
        chain: system.id,
        actor: actorOf(system.caller),
        action: 'members.replaced',
        subject: system.id,
        details: { moves },
      })
      return answer
    }),
})

async function membersOf(members: Repositories['members'], given: readonly WantedMember[]) {
  const wanted = given.map(({ email, role }) => ({ email: normalizeEmail(email), role }))
  const people = await members.findPeople(wanted.map(({ email }) => email))
  const idByEmail = new Map(people.map(({ email, id }) => [email, id]))
  const faults = memberFaults(wanted, new Set(idByEmail.keys()))
  if (faults.length > 0) throw invalidRequest(faults)
  return wanted.map(({ email, role }) => ({ id: idByEmail.get(email) ?? '', role }))
}
