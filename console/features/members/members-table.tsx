import { WordButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { formatDay } from '#console/lib/format.ts'
import type { MemberWire } from '#shared/contracts/members.contract.ts'
import { type MemberMove, ROLE_CHOICES, roleInWords } from './member-moves.ts'

/** Who works on a system; where the reader may, with ways to change it. */
export function MembersTable({
  members,
  own,
  onMove,
}: {
  members: readonly MemberWire[]
  /** Id of the reader. */
  own: string
  /** None where the reader may not change the list. */
  onMove: ((move: MemberMove) => void) | undefined
}) {
  return (
    <div className="ledger mt-14">
      <table aria-label="Members">
        <thead>
          <tr>
            <th>Name</th>
            <th className="@max-[560px]:hidden">E-mail</th>
            <th className="w-180 @max-[560px]:w-150">Role</th>
            <th className="w-120 @max-[820px]:hidden">Since</th>
            {onMove !== undefined && (
              <th className="w-80">
                <span className="sr-only">Remove</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {members.map((member) => (
            <tr key={member.id}>
              <td className="row-start py-6! pr-12!">
                <span className="font-medium">{member.name}</span>
                {member.id === own && <span className="text-ink-soft">, you</span>}
                <span className="hidden text-13 break-all text-ink-soft @max-[560px]:block">
                  {member.email}
                </span>
              </td>
              <td className="truncate pr-12! text-ink-soft @max-[560px]:hidden">{member.email}</td>
              <td>
                {onMove === undefined ? (
                  roleInWords(member.role)
                ) : (
                  <Choice
                    label={`Role of ${member.name}`}
                    value={member.role}
                    options={ROLE_CHOICES}
                    onChange={(role) => onMove({ kind: 'role', email: member.email, role })}
                  />
                )}
              </td>
              <td className="figures text-ink-soft @max-[820px]:hidden">
                {formatDay(member.since)}
              </td>
              {onMove !== undefined && (
                <td className="text-end!">
                  <WordButton
                    aria-label={`Remove ${member.name}`}
                    onClick={() => onMove({ kind: 'remove', email: member.email })}
                  >
                    Remove
                  </WordButton>
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
