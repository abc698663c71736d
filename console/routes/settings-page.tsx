import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useMemo, useState } from 'react'
import { type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { useTriedEffect } from '#console/features/checks/tried-effect.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import {
  leftOf,
  readSettings,
  type SettingsDraft,
  type SettingsPatch,
  settingsEdits,
  settingsVersions,
} from '#console/features/settings/settings-draft.ts'
import { SettingsFields } from '#console/features/settings/settings-fields.tsx'
import { saveSettings } from '#console/features/settings/settings.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'
import { RefusedWrite } from './refused-write.tsx'
import { useWhoMay } from './who-may.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.list(system)),
  ])
  return null
}

/** The settings of a system itself. */
export function Component() {
  const { system: key = '' } = useParams()
  const { data: system } = useSuspenseQuery(systemQueries.one(key))
  const { data: evaluation } = useEvaluation(key, system.head.revision)
  const names = useModelNames(key)
  const [draft, setDraft] = useState<SettingsDraft>({})
  const edits = useMemo(() => {
    const patch = readSettings(draft)
    return patch && settingsEdits(system, patch)
  }, [draft, system])
  const tried = useTriedEffect(evaluation, edits)
  const isHandling = edits === undefined && Object.keys(draft).length > 0
  return (
    <>
      <title>{`Settings of ${key} · Dyewright`}</title>
      <SettingsForm system={key} draft={draft} onDraft={setDraft} />
      {isHandling ? (
        <p className="max-w-560 pt-22 pb-36 text-ink-soft">
          This moves no verdict: it is handling, written to the audit log and in no revision.
        </p>
      ) : (
        <EffectOnVerdicts tried={tried} names={names} />
      )}
    </>
  )
}

function SettingsForm({
  system: key,
  draft,
  onDraft,
}: {
  system: string
  draft: SettingsDraft
  onDraft: (draft: SettingsDraft) => void
}) {
  const { data: system } = useSuspenseQuery(systemQueries.one(key))
  const [message, setMessage] = useState('')
  const obstacle = useObstacle(key, draft)
  const saving = useMutation({
    mutationFn: saveSettings,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['system', key] })
      setMessage('')
      onDraft({})
    },
    onError: async (error) => {
      if (isRefusal(error, 412)) await queryClient.invalidateQueries({ queryKey: ['system', key] })
    },
  })
  const refusal = saving.isError ? writeRefusal(saving.error) : undefined
  const isEdited = Object.keys(draft).length > 0
  const save = () => {
    const patch = readSettings(draft)
    if (obstacle !== undefined || saving.isPending || patch === undefined) return
    saving.mutate({ system: key, etag: system.etag, patch, message })
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    save()
  }
  const putBack = () => {
    saving.reset()
    onDraft({})
  }
  const fault = (member: string) => faultAt(refusal, `/${member}`)
  return (
    <form onSubmit={submit} className="border-b border-ink pt-6 pb-18">
      <SettingsFields
        system={system}
        draft={draft}
        faults={{
          name: fault('name'),
          level: fault('level'),
          p3: fault('p3') ?? fault('p3Gates'),
          disabledFloor: fault('disabledFloor'),
          writeMode: fault('writeMode'),
          protectedBranches: fault('protectedBranches'),
        }}
        onChange={(part) => onDraft(leftOf(system, { ...draft, ...part }))}
      />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={fault('message')}
        isEdited={isEdited}
        isSaving={saving.isPending}
        obstacle={obstacle}
        action="Save the settings"
        onPutBack={putBack}
      />
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="The system has changed since you opened this. What you typed is kept, and is measured against what is there now."
          rows={settingsVersions(system, draft)}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && <RefusedWrite refusal={refusal} />}
      {saving.isSuccess &&
        !isEdited &&
        (isMeasured(saving.variables.patch) ? (
          <SavedNote saved={saving.data} />
        ) : (
          <SavedHandling />
        ))}
    </form>
  )
}

const LEAD_MEMBERS = new Set(['level', 'writeMode', 'protectedBranches'])

/** Why it cannot be saved just now, in a sentence or two. */
function useObstacle(key: string, draft: SettingsDraft): string | undefined {
  const { data: system } = useSuspenseQuery(systemQueries.one(key))
  const who = useWhoMay(key)
  const members = Object.keys(draft)
  if (!who.is('maintainer', 'accessibility-lead')) {
    return `Trying is for everyone; saving takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (members.length === 0) return 'Nothing is edited yet.'
  if (readSettings(draft) === undefined) return 'The least ratio holds no number.'
  if (draft.name?.trim() === '') return 'A system has a name.'
  const isLeads = members.every((member) => LEAD_MEMBERS.has(member))
  if (!who.is('maintainer') && !isLeads) {
    return `An accessibility lead changes level, write mode and protected branches; the rest takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (who.is('accessibility-lead')) return undefined
  if (system.writeMode === 'review' && draft.writeMode === 'direct') {
    return `Setting direct again takes an accessibility lead.${who.oneOf('accessibility-lead')}`
  }
  return undefined
}

/** Whether any of the members stands in a revision. */
const isMeasured = (patch: SettingsPatch) =>
  ['level', 'p3', 'p3Gates', 'disabledFloor'].some((member) => Object.hasOwn(patch, member))

function SavedHandling() {
  return (
    <p role="status" className="mt-12 font-semibold">
      Saved; no verdict moved, and no revision was made.
    </p>
  )
}
