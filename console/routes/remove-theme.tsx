import { useMutation } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { useTriedEffect } from '#console/features/checks/tried-effect.ts'
import { removalEdits } from '#console/features/themes/theme-draft.ts'
import { removeTheme } from '#console/features/themes/themes.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { useModelNames } from './model-names.ts'
import { RefusedWrite } from './refused-write.tsx'
import { useWhoMay } from './who-may.ts'

/** The way to remove a theme: first what that would do, then the decision. */
export function RemoveTheme({
  system,
  theme,
  evaluation,
}: {
  system: string
  theme: ThemeWire
  evaluation: Evaluation | undefined
}) {
  const [isAsked, setAsked] = useState(false)
  const who = useWhoMay(system)
  return (
    <section className="border-t border-rule pt-16 pb-44">
      <h2 className="text-16 font-semibold">Remove it</h2>
      {!isAsked ? (
        <p className="mt-6 flex flex-wrap gap-x-28 gap-y-6">
          <span className="text-ink-soft">
            {who.is('maintainer')
              ? 'Its own values and the rules for it go with it; what it would move is shown first.'
              : `Removing a theme takes a maintainer.${who.oneOf('maintainer')}`}
          </span>
          {who.is('maintainer') && (
            <WordButton onClick={() => setAsked(true)}>Remove {theme.key}</WordButton>
          )}
        </p>
      ) : (
        <AskedRemoval
          system={system}
          theme={theme}
          evaluation={evaluation}
          onKeep={() => setAsked(false)}
        />
      )}
    </section>
  )
}

function AskedRemoval({
  system,
  theme,
  evaluation,
  onKeep,
}: {
  system: string
  theme: ThemeWire
  evaluation: Evaluation | undefined
  onKeep: () => void
}) {
  const navigate = useNavigate()
  const names = useModelNames(system)
  const [message, setMessage] = useState('')
  const edits = useMemo(
    () => evaluation && removalEdits(evaluation.resolved.model, theme.id),
    [evaluation, theme.id],
  )
  const tried = useTriedEffect(evaluation, edits)
  const removing = useMutation({
    mutationFn: removeTheme,
    onSuccess: async () => {
      await navigate(paths.themes(system))
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
    },
  })
  const remove = () => removing.mutate({ system, theme: theme.key, etag: theme.etag, message })
  return (
    <>
      <EffectOnVerdicts tried={tried} names={names} />
      <div className="flex flex-wrap items-end gap-x-28 gap-y-12">
        <LineField
          label="Why, stands on the revision"
          value={message}
          maxLength={500}
          autoComplete="off"
          onChange={(event) => setMessage(event.target.value)}
          className="w-full wide:w-250 full:w-450"
        />
        <WordButton onClick={remove} aria-busy={removing.isPending}>
          {removing.isPending ? 'Removing' : `Remove ${theme.key} for good`}
        </WordButton>
        <WordButton onClick={onKeep}>Keep it</WordButton>
      </div>
      {removing.isError && <RefusedWrite refusal={writeRefusal(removing.error)} />}
    </>
  )
}
