import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, type ReactNode, useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import {
  isNarrower,
  type ScopedRules,
  scopedRules,
  scopeInWords,
} from '#console/features/rules/rule-scopes.ts'
import { ruleVersions } from '#console/features/rules/rule-versions.ts'
import { ruleQueries, saveRules } from '#console/features/rules/rules.queries.ts'
import { Governed } from '#console/features/rules/rules-table.tsx'
import { ScopeFields } from '#console/features/rules/scope-fields.tsx'
import { scopeFields } from '#console/features/rules/scope-text.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'
import { RefusedWrite } from './refused-write.tsx'

import { useRulesEdit } from './rules-edit.ts'
import { useWhoMay } from './who-may.ts'

/** The rules of one scope as fields, with what they govern and what an edit would move. */
export function OpenedRules({ system, scoped }: { system: string; scoped: ScopedRules }) {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: rules } = useSuspenseQuery(ruleQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: evaluation } = useEvaluation(system, settings.head.revision)
  const names = useModelNames(system)
  const { scope, governs } = scoped
  const derived = scope.kind === 'system' ? [] : themes.slice(1).map(({ key }) => key)
  const edit = useRulesEdit({ scope, standing: scoped.rules, themes: derived }, evaluation)
  const narrower = scopedRules(rules, tokens)
    .filter((each) => isNarrower(each.scope, scope))
    .map((each) => scopeInWords(each.scope))
  return (
    <div className="font-normal">
      <RulesForm system={system} scoped={scoped} edit={edit}>
        {evaluation !== undefined && (
          <ScopeFields
            scope={scope}
            text={edit.text}
            model={evaluation.resolved.model}
            faults={edit.faults}
            onChange={edit.setText}
          />
        )}
        {scope.kind === 'system' && <ThemeRulesNote system={system} themes={themes} />}
      </RulesForm>
      <div className="grid gap-x-44 full:grid-cols-2">
        <EffectOnVerdicts tried={edit.tried} names={names} />
        <Governed
          governs={governs}
          narrower={narrower}
          href={(name) => paths.token(system, name)}
        />
      </div>
    </div>
  )
}

/** Where the theme rules of the whole system stand. */
function ThemeRulesNote({
  system,
  themes,
}: {
  system: string
  themes: readonly { readonly key: string; readonly from?: string | undefined }[]
}) {
  const derived = themes.filter(({ from }) => from !== undefined)
  if (derived.length === 0) return null
  return (
    <p className="mt-12 flex flex-wrap gap-x-12 gap-y-4 text-ink-soft">
      The theme rules of the whole system stand on the themes:
      {derived.map(({ key }) => (
        <Link key={key} to={paths.theme(system, key)} className="word-woad">
          {key}
        </Link>
      ))}
    </p>
  )
}

type RulesEdit = ReturnType<typeof useRulesEdit>

function RulesForm({
  system,
  scoped,
  edit,
  children,
}: {
  system: string
  scoped: ScopedRules
  edit: RulesEdit
  children: ReactNode
}) {
  const { data: standing } = useSuspenseQuery(ruleQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const [message, setMessage] = useState('')
  const obstacle = useObstacle(system, scoped, edit)
  const { scope } = scoped
  const etag =
    scope.kind === 'token' ? tokens.find(({ name }) => name === scope.name)?.etag : standing.etag
  const saving = useMutation({
    mutationFn: saveRules,
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
    const { rules } = edit
    if (obstacle !== undefined || saving.isPending || rules === undefined) return
    saving.mutate({ system, scope, rules, standing, etag: etag ?? '', message })
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
      {children}
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={edit.isEdited}
        isSaving={saving.isPending}
        obstacle={obstacle}
        onPutBack={putBack}
      />
      {scope.kind !== 'system' && (
        <p className="mt-10">
          <WordButton onClick={() => edit.setText(scopeFields({}, Object.keys(edit.text.themes)))}>
            Say nothing for {scopeInWords(scope)}
          </WordButton>
        </p>
      )}
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="Somebody has saved rules since you opened these. What you typed is kept, and is measured against what is there now."
          rows={ruleVersions(scoped.rules, edit.rules ?? {})}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && <RefusedWrite refusal={refusal} />}
      {saving.isSuccess && !edit.isEdited && <SavedNote saved={saving.data} />}
    </form>
  )
}

/** Why the rules cannot be saved just now, in a sentence or two. */
function useObstacle(system: string, { scope }: ScopedRules, edit: RulesEdit): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer')) {
    return `Trying is for everyone; saving takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (scope.kind === 'token' && tokens.find(({ name }) => name === scope.name)?.locked) {
    return 'This token is locked.'
  }
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (!edit.isEdited) return 'Nothing is edited yet.'
  if (edit.rules === undefined) return 'A field holds what cannot be used.'
  if (edit.faults.length > 0) return `${edit.faults[0]?.detail}.`
  return edit.tried.kind === 'unresolvable'
    ? 'The colours cannot be resolved with this edit.'
    : undefined
}
