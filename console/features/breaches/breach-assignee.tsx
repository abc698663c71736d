import { useMutation, useQueryClient } from '@tanstack/react-query'
import { type ReactNode, useState } from 'react'
import { type WriteRefusal, writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import { RefusalNote } from '#console/ui/refusal-note.tsx'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import type { Handler } from './breach-sentence.tsx'
import { assignBreach, breachQueries } from './breaches.queries.ts'

/** Who is on a breach; for who may, with the way to name somebody else. */
export function BreachAssignee({
  system,
  breach,
  people,
  self,
  obstacle,
  refused,
}: {
  system: string
  breach: BreachWire
  people: readonly Handler[]
  /** Id of the reader. */
  self: string
  /** Whom assigning takes; none for who may. */
  obstacle: string | undefined
  refused: (refusal: WriteRefusal) => ReactNode
}) {
  const assigning = useAssigning(system, breach.id)
  const [fault, setFault] = useState<string>()
  const assign = (assignee: string | null) =>
    assigning.mutate({ system, id: breach.id, seen: breach, assignee })
  const { assignee } = breach
  if (obstacle !== undefined) {
    return (
      <p className="mt-12 text-ink-soft">
        {assignee === null ? 'Nobody is on it.' : `${assignee.name} is on it.`} {obstacle}
      </p>
    )
  }
  const named = handlerNames(people)
  const byName = (name: string) => {
    const found = people.find(({ id }) => named.get(id) === name)
    setFault(found === undefined ? 'No member has this name.' : undefined)
    if (found !== undefined && found.id !== assignee?.id) assign(found.id)
  }
  const refusal = assigning.isError ? writeRefusal(assigning.error) : undefined
  return (
    <div className="mt-14">
      <NameBox
        key={breach.etag}
        label="Assigned to"
        value={assignee === null ? '' : (named.get(assignee.id) ?? assignee.name)}
        names={[...named.values()]}
        fault={fault}
        nothing="No member has this name."
        onChange={byName}
        className="max-w-300"
      />
      <p className="mt-8 flex flex-wrap gap-x-28 gap-y-6">
        {assignee?.id !== self && people.some(({ id }) => id === self) && (
          <WordButton onClick={() => assign(self)}>Take it yourself</WordButton>
        )}
        {assignee !== null && <WordButton onClick={() => assign(null)}>Take it off</WordButton>}
      </p>
      {refusal?.kind === 'changed' ? (
        <RefusalNote title="Somebody has handled this breach since you opened it. It stands here as it is now.">
          <WordButton onClick={() => assign(assigning.variables?.assignee ?? null)}>
            Assign it all the same
          </WordButton>
        </RefusalNote>
      ) : (
        refusal !== undefined && refused(refusal)
      )}
    </div>
  )
}

function useAssigning(system: string, id: string) {
  const client = useQueryClient()
  const readAgain = async () => {
    await client.invalidateQueries({ queryKey: breachQueries.one(system, id).queryKey })
    await client.invalidateQueries({ queryKey: ['system', system, 'breaches'] })
  }
  return useMutation({
    mutationFn: assignBreach,
    onSuccess: async (breach) => {
      client.setQueryData(breachQueries.one(system, id).queryKey, breach)
      await readAgain()
    },
    onError: readAgain,
  })
}

/** Names to choose from, told apart by the end of an id where two people share one. */
function handlerNames(people: readonly Handler[]): Map<string, string> {
  const counts = new Map<string, number>()
  for (const { name } of people) counts.set(name, (counts.get(name) ?? 0) + 1)
  return new Map(
    people.map(({ id, name }) => [
      id,
      (counts.get(name) ?? 0) > 1 ? `${name} (${id.slice(-4)})` : name,
    ]),
  )
}
