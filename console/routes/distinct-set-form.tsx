import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { saveSet } from '#console/features/distinct-sets/distinct-sets.queries.ts'
import {
  draftOf,
  isSameDraft,
  lackOf,
  setVersions,
} from '#console/features/distinct-sets/set-draft.ts'
import { SetFields } from '#console/features/distinct-sets/set-fields.tsx'
import { SetMeasures } from '#console/features/distinct-sets/set-measures.tsx'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import type { DistinctSetWire } from '#shared/contracts/distinct-sets.contract.ts'
import { RefusedWrite } from './refused-write.tsx'
import { useSetMeasures } from './set-measures.ts'
import { useTokenCells } from './token-cells.tsx'
import { useWhoMay } from './who-may.ts'

/** A distinct set being made or edited, measured as it is written. */
export function DistinctSetForm({
  system,
  set,
  onSaved,
}: {
  system: string
  /** None where one is made. */
  set: DistinctSetWire | undefined
  onSaved: (id: string) => void
}) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const cellOf = useTokenCells(system)
  const measuresOf = useSetMeasures(system)
  const [draft, setDraft] = useState(draftOf(set))
  const [message, setMessage] = useState('')
  const isEdited = !isSameDraft(draft, draftOf(set))
  const obstacle = useObstacle(system, isEdited ? lackOf(draft) : 'Nothing is edited yet.')
  const saving = useMutation({
    mutationFn: saveSet,
    onSuccess: async ({ id }) => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      setMessage('')
      onSaved(id)
    },
    onError: async (error) => {
      if (isRefusal(error, 412)) {
        await queryClient.invalidateQueries({ queryKey: ['system', system, 'distinct-sets'] })
      }
    },
  })
  const refusal = saving.isError ? writeRefusal(saving.error) : undefined
  const save = () => {
    if (obstacle === undefined && !saving.isPending)
      saving.mutate({ system, set, message, ...draft })
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    save()
  }
  const putBack = () => {
    saving.reset()
    setDraft(draftOf(set))
  }
  return (
    <form onSubmit={submit} className="border-b border-ink pt-14 pb-18">
      <SetFields
        draft={draft}
        names={tokens.map(({ name }) => name)}
        cellOf={cellOf}
        faults={{ name: faultAt(refusal, '/name'), tokens: faultAt(refusal, '/tokens') }}
        onChange={setDraft}
      />
      {draft.tokens.length > 1 && (
        <SetMeasures label="Closest couples as written here" measures={measuresOf(draft.tokens)} />
      )}
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={isEdited}
        isSaving={saving.isPending}
        obstacle={obstacle}
        action={set === undefined ? 'Make the set' : 'Save to the head'}
        onPutBack={putBack}
      />
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="Somebody has saved this set since you opened it. What you typed is kept."
          rows={setVersions(draftOf(set), draft)}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && <RefusedWrite refusal={refusal} />}
      {saving.isSuccess && !isEdited && <SavedNote saved={saving.data} />}
    </form>
  )
}

/** Why it cannot be saved just now, in a sentence or two. */
function useObstacle(system: string, lack: string | undefined): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer')) {
    return `Measuring is for everyone; saving takes a maintainer.${who.oneOf('maintainer')}`
  }
  return settings.writeMode === 'review' ? 'This system takes edits by review only.' : lack
}
