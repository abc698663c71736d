import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { pairVersions } from '#console/features/pairs/pair-versions.ts'
import { pairQueries, savePair } from '#console/features/pairs/pairs.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'
import type { PairEdit } from './pair-edit.ts'
import { PairMembers } from './pair-members.tsx'
import { RefusedWrite } from './refused-write.tsx'
import { WeakeningNote } from './weakening-note.tsx'
import { useWhoMay } from './who-may.ts'

/** The fields of a pair, and the decision to save them. */
export function PairForm({
  system,
  pair,
  edit,
}: {
  system: string
  pair: PairWire
  edit: PairEdit
}) {
  const [message, setMessage] = useState('')
  const obstacle = useObstacle(system, edit)
  const saving = useMutation({
    mutationFn: savePair,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      setMessage('')
      edit.putBack()
    },
    onError: async (error) => {
      if (isRefusal(error, 412)) {
        await queryClient.invalidateQueries({ queryKey: pairQueries.all(system).queryKey })
      }
    },
  })
  const refusal = saving.isError ? writeRefusal(saving.error) : undefined
  const save = () => {
    if (obstacle !== undefined || saving.isPending || edit.input === undefined) return
    const { draft, input } = edit
    saving.mutate({ system, id: pair.id, etag: pair.etag, draft, input, message })
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    save()
  }
  const putBack = () => {
    saving.reset()
    edit.putBack()
  }
  return (
    <form onSubmit={submit} className="border-b border-ink pb-18">
      <PairMembers system={system} edit={edit} refusal={refusal} />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={edit.isEdited}
        isSaving={saving.isPending}
        obstacle={obstacle}
        onPutBack={putBack}
      />
      {refusal === undefined && <WeakeningNote system={system} weakenings={edit.weakenings} />}
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="Somebody has saved this pair since you opened it. What you typed is kept, and is measured against what is there now."
          rows={pairVersions(pair, edit.draft)}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && <RefusedWrite refusal={refusal} />}
      {saving.isSuccess && !edit.isEdited && <SavedNote saved={saving.data} />}
    </form>
  )
}

const LEAD_MEMBERS = new Set(['level', 'exempt', 'reason'])
const EXEMPTION_MEMBERS = new Set(['exempt', 'reason'])

/** Why it cannot be saved just now, in a sentence or two. */
function useObstacle(system: string, edit: PairEdit): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer', 'accessibility-lead')) {
    return `Trying is for everyone; saving takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (!edit.isEdited) return 'Nothing is edited yet.'
  if (edit.faults.length > 0) return `${edit.faults[0]?.detail.replace(/\.$/, '')}.`
  if (edit.tried.kind === 'unresolvable') return 'The colours cannot be resolved with this edit.'
  const members = Object.keys(edit.draft)
  if (!who.is('maintainer') && !members.every((member) => LEAD_MEMBERS.has(member))) {
    return `An accessibility lead edits level and exemption; the rest takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (!who.is('accessibility-lead') && members.some((member) => EXEMPTION_MEMBERS.has(member))) {
    return `Exempting a pair takes the accessibility lead.${who.oneOf('accessibility-lead')}`
  }
  return undefined
}
