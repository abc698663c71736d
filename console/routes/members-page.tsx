import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { AddMember } from '#console/features/members/add-member.tsx'
import { afterMove, type MemberMove, roleInWords } from '#console/features/members/member-moves.ts'
import { MembersTable } from '#console/features/members/members-table.tsx'
import { memberQueries, saveMembers } from '#console/features/members/members.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, type WriteRefusal, writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { RefusalNote } from '#console/ui/refusal-note.tsx'
import { countOf } from '#shared/checks/finding-words.ts'
import type { MemberWire } from '#shared/contracts/members.contract.ts'
import { useMe } from './account-items.tsx'
import { RefusedWrite } from './refused-write.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(memberQueries.list(system))
  return null
}

/** Who works on a system, and in which role. */
export function Component() {
  const { system = '' } = useParams()
  const me = useMe()
  const { data: list } = useSuspenseQuery(memberQueries.list(system))
  const { saving, move } = useMoves(system)
  const [leaving, setLeaving] = useState<MemberWire>()
  const take = (next: MemberMove) => {
    const member = list.items.find(({ email }) => email === next.email)
    if (next.kind === 'remove' && member !== undefined) setLeaving(member)
    else move(next)
  }
  const refusal = saving.isError ? writeRefusal(saving.error) : undefined
  const emailFault = saving.variables?.kind === 'add' ? faultAt(refusal, '/items') : undefined
  return (
    <>
      <title>{`Members of ${system} · Dyewright`}</title>
      <p className="pt-14 text-ink-soft">
        {startSentence(countOf(list.items.length, 'member'))}.{' '}
        {me.user.admin
          ? 'A new role holds at once, for their keys too.'
          : 'An administrator adds people, gives roles and removes them.'}
      </p>
      <MembersTable
        members={list.items}
        own={me.user.id}
        onMove={me.user.admin ? take : undefined}
      />
      <div aria-live="polite">
        {leaving !== undefined && (
          <Leaving
            member={leaving}
            onStay={() => setLeaving(undefined)}
            onLeave={() => {
              setLeaving(undefined)
              move({ kind: 'remove', email: leaving.email })
            }}
          />
        )}
        {saving.isSuccess && <p className="mt-12">{movedInWords(saving.variables, list.items)}</p>}
      </div>
      {refusal !== undefined && emailFault === undefined && (
        <MovesRefusal refusal={refusal} onAgain={() => move(saving.variables)} />
      )}
      {me.user.admin && (
        <AddMember
          key={saving.isSuccess ? list.etag : 'adding'}
          emails={list.items.map(({ email }) => email)}
          fault={emailFault}
          isSaving={saving.isPending}
          onAdd={(member) => move({ kind: 'add', ...member })}
        />
      )}
    </>
  )
}

/** Makes one move at a time, on the list as it was read last. */
function useMoves(system: string) {
  const { data: list } = useSuspenseQuery(memberQueries.list(system))
  const saving = useMutation({
    mutationFn: (move: MemberMove) =>
      saveMembers({ system, etag: list.etag, items: afterMove(list.items, move) }),
    onSuccess: (saved) => queryClient.setQueryData(memberQueries.list(system).queryKey, saved),
    onError: async (error) => {
      if (isRefusal(error, 412)) {
        await queryClient.invalidateQueries({ queryKey: memberQueries.list(system).queryKey })
      }
    },
  })
  const move = (next: MemberMove | undefined) => {
    if (next !== undefined && !saving.isPending) saving.mutate(next)
  }
  return { saving, move }
}

function Leaving({
  member,
  onStay,
  onLeave,
}: {
  member: MemberWire
  onStay: () => void
  onLeave: () => void
}) {
  return (
    <div className="mt-14 border-y border-ink py-12">
      <p>
        <span className="font-semibold">Remove {member.name}?</span> Keys of theirs in this system
        stop answering at once; what they did stays in its history.
      </p>
      <p className="mt-8 flex gap-x-28">
        <WordButton onClick={onLeave}>Yes, remove {member.name}</WordButton>
        <WordButton onClick={onStay}>Keep</WordButton>
      </p>
    </div>
  )
}

function MovesRefusal({ refusal, onAgain }: { refusal: WriteRefusal; onAgain: () => void }) {
  if (refusal.kind !== 'changed') return <RefusedWrite refusal={refusal} />
  return (
    <RefusalNote title="Somebody has changed the list since you read it. It stands above as it is now; nothing of yours is in it yet.">
      <WordButton onClick={onAgain}>Do it again on this list</WordButton>
    </RefusalNote>
  )
}

function movedInWords(move: MemberMove, members: readonly MemberWire[]): string {
  const name = members.find(({ email }) => email === move.email)?.name ?? move.email
  return move.kind === 'remove'
    ? `${name} is a member no longer.`
    : `${name} is ${roleInWords(move.role)} here now.`
}
