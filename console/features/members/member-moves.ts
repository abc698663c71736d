import type { MemberWire } from '#shared/contracts/members.contract.ts'
import type { Role } from '#shared/contracts/permissions.ts'

/** One thing that is to become of a list of members. */
export type MemberMove =
  | { readonly kind: 'role'; readonly email: string; readonly role: Role }
  | { readonly kind: 'add'; readonly email: string; readonly role: Role }
  | { readonly kind: 'remove'; readonly email: string }

type Listed = Pick<MemberWire, 'email' | 'role'>

/** The list after the move, whoever else came and went meanwhile. */
export function afterMove(members: readonly Listed[], move: MemberMove): Listed[] {
  const others = members.filter(({ email }) => email !== move.email)
  if (move.kind === 'remove') return others
  if (move.kind === 'add') return [...others, { email: move.email, role: move.role }]
  return members.map((member) =>
    member.email === move.email ? { email: member.email, role: move.role } : member,
  )
}

export const ROLE_CHOICES = [
  { value: 'engineer', text: 'engineer' },
  { value: 'maintainer', text: 'maintainer' },
  { value: 'accessibility-lead', text: 'accessibility lead' },
] as const satisfies readonly { value: Role; text: string }[]

export const roleInWords = (role: Role): string => role.replace('-', ' ')

/** What each role may do, in a sentence. */
export const ROLE_SENTENCES: { readonly [role in Role]: string } = {
  engineer: 'reads and fetches, and makes read keys of their own',
  maintainer: 'edits, and makes keys for pipelines, too',
  'accessibility-lead': 'edits exemptions, levels and which themes gate; handles breaches',
}
