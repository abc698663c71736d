import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { themeRuleInWords } from '#console/features/rules/rule-words.ts'
import { ThemeRuleFields } from '#console/features/rules/theme-rule-fields.tsx'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { possibleParents } from '#console/features/themes/derivation.ts'
import type { DraftedTheme } from '#console/features/themes/theme-draft.ts'
import { ThemeFields } from '#console/features/themes/theme-fields.tsx'
import { themeVersions } from '#console/features/themes/theme-versions.ts'
import { saveTheme, themeQueries } from '#console/features/themes/themes.queries.ts'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, type WriteRefusal, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { useThemeEdit } from './theme-edit.ts'
import { useWhoMay } from './who-may.ts'
import { RefusedWrite } from './refused-write.tsx'

export type ThemeEdit = ReturnType<typeof useThemeEdit>

/** The fields of a theme, and the decision to save them. */
export function ThemeForm({
  system,
  theme,
  edit,
}: {
  system: string
  theme: ThemeWire
  edit: ThemeEdit
}) {
  const [message, setMessage] = useState('')
  const obstacle = useObstacle(system, edit)
  const saving = useMutation({
    mutationFn: saveTheme,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      setMessage('')
      edit.putBack()
    },
    onError: async (error) => {
      if (isRefusal(error, 412)) {
        await queryClient.invalidateQueries({ queryKey: ['system', system] })
      }
    },
  })
  const refusal = saving.isError ? writeRefusal(saving.error) : undefined
  const save = () => {
    if (obstacle !== undefined || saving.isPending) return
    saving.mutate({ system, theme: theme.key, etag: theme.etag, draft: edit.draft, message })
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
      <ThemeMembers system={system} theme={edit.drafted} edit={edit} refusal={refusal} />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={edit.isEdited}
        isSaving={saving.isPending}
        obstacle={obstacle}
        onPutBack={putBack}
      />
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="Somebody has saved this theme since you opened it. What you typed is kept, and is measured against what is there now."
          rows={themeVersions(theme, edit.draft, (rule) =>
            themeRuleInWords({ kind: 'keep', ...rule }),
          )}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && <RefusedWrite refusal={refusal} />}
      {saving.isSuccess && !edit.isEdited && <SavedNote saved={saving.data} />}
    </form>
  )
}

/** The members of a theme as fields, faults beside what they are about. */
export function ThemeMembers({
  system,
  theme,
  edit,
  refusal,
}: {
  system: string
  theme: DraftedTheme
  edit: ThemeEdit
  refusal: WriteRefusal | undefined
}) {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const names = tokens.map(({ name }) => name)
  const fault = (pointer: string) =>
    edit.faults.find((each) => each.pointer === pointer)?.detail ?? faultAt(refusal, pointer)
  return (
    <ThemeFields
      theme={theme}
      parents={possibleParents(themes, theme.key)}
      tokens={names}
      systemLevel={settings.level}
      faults={{
        name: edit.draft.name?.trim() === '' ? 'A theme has a name.' : fault('/name'),
        from: fault('/from'),
        ground: fault('/ground'),
        ink: fault('/ink'),
        level: fault('/level'),
        gating: fault('/gating'),
      }}
      onChange={edit.put}
    >
      <ThemeRuleFields
        subject="Its colours"
        text={edit.ruleText}
        tokens={names}
        referenceFault={fault('/rule/against')}
        onChange={edit.setRuleText}
      />
    </ThemeFields>
  )
}

const LEAD_MEMBERS = new Set(['level', 'gating'])

/** Why it cannot be saved just now, in a sentence or two. */
function useObstacle(system: string, edit: ThemeEdit): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer', 'accessibility-lead')) {
    return `Trying is for everyone; saving takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (!edit.isEdited) return 'Nothing is edited yet.'
  if (!edit.isRuleRead) return 'A field of the rule holds no number.'
  if (edit.drafted.name.trim() === '') return 'A theme has a name.'
  if (edit.faults.length > 0) return `${edit.faults[0]?.detail}.`
  if (edit.tried.kind === 'unresolvable') return 'The colours cannot be resolved with this edit.'
  const isLeads = Object.keys(edit.draft).every((member) => LEAD_MEMBERS.has(member))
  if (!who.is('maintainer') && !isLeads) {
    return `An accessibility lead edits level and gating; the rest takes a maintainer.${who.oneOf('maintainer')}`
  }
  return undefined
}
