import type { Role } from '#shared/contracts/permissions.ts'
import type { Fault } from '#shared/contracts/problems.ts'

export interface WantedMember {
  readonly email: string
  readonly role: Role
}

/** Everything that speaks against a list of members; addresses as they are kept. */
export function memberFaults(wanted: readonly WantedMember[], known: ReadonlySet<string>): Fault[] {
  const seen = new Set<string>()
  return wanted.flatMap(({ email }, index) => {
    const pointer = `/items/${index}/email`
    if (!known.has(email)) return [{ pointer, detail: 'Nobody has this address' }]
    if (seen.has(email)) return [{ pointer, detail: 'Stands in the list already' }]
    seen.add(email)
    return []
  })
}

interface Membership {
  readonly id: string
  readonly role: Role
}

/** Someone who comes (from no role), goes (to none), or changes. */
export interface MembershipMove {
  readonly user: string
  readonly before: Role | null
  readonly after: Role | null
}

/** What the replacement does, for the audit: only who came, went or changed. */
export function membershipMoves(
  before: readonly Membership[],
  after: readonly Membership[],
): MembershipMove[] {
  const roleBefore = new Map(before.map(({ id, role }) => [id, role]))
  const roleAfter = new Map(after.map(({ id, role }) => [id, role]))
  const people = [...new Set([...roleBefore.keys(), ...roleAfter.keys()])]
  return people
    .map((id) => ({
      user: id,
      before: roleBefore.get(id) ?? null,
      after: roleAfter.get(id) ?? null,
    }))
    .filter(({ before: from, after: to }) => from !== to)
}
