import { WordButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { formatDay } from '#console/lib/format.ts'
import { useNarrow } from '#console/ui/window-size.ts'
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
  const narrow = useNarrow()
  return (
    <div className="ledger mt-14">
      <table aria-label="Members">
        <thead>
          <tr>
            <th>Name</th>
            {!narrow && (
              <>
                <th>E-mail</th>
                <th className="w-180">Role</th>
                <th className="w-120 @max-[820px]:hidden">Since</th>
                {onMove !== undefined && (
                  <th className="w-80">
                    <span className="sr-only">Remove</span>
                  </th>
                )}
              </>
            )}
          </tr>
        </thead>
        <tbody>
          {members.map((member) => (
            <MemberRow key={member.id} member={member} isOwn={member.id === own} onMove={onMove} />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function MemberRow({
  member,
  isOwn,
  onMove,
}: {
  member: MemberWire
  isOwn: boolean
  onMove: ((move: MemberMove) => void) | undefined
}) {
  const narrow = useNarrow()
  const { name, email } = member
  const role =
    onMove === undefined ? (
      roleInWords(member.role)
    ) : (
      <Choice
        label={`Role of ${name}`}
        value={member.role}
        options={ROLE_CHOICES}
        onChange={(next) => onMove({ kind: 'role', email, role: next })}
      />
    )
  const remove = onMove !== undefined && (
    <WordButton aria-label={`Remove ${name}`} onClick={() => onMove({ kind: 'remove', email })}>
      Remove
    </WordButton>
  )
  return (
    <tr>
      <td className="row-start py-6! pr-12!">
        <span className="font-medium">{name}</span>
        {isOwn && <span className="text-ink-soft">, you</span>}
        {narrow && (
          <>
            <span className="block text-13 break-all text-ink-soft">{email}</span>
            <span className="mt-4 flex items-baseline justify-between">
              {role}
              {remove}
            </span>
          </>
        )}
      </td>
      {!narrow && (
        <>
          <td className="truncate pr-12! text-ink-soft">{email}</td>
          <td>{role}</td>
          <td className="figures text-ink-soft @max-[820px]:hidden">{formatDay(member.since)}</td>
          {onMove !== undefined && <td className="text-end!">{remove}</td>}
        </>
      )}
    </tr>
  )
}
