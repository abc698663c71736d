import { useMutation } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { type TriedEffect, useTriedEffect } from '#console/features/checks/tried-effect.ts'
import { removePair } from '#console/features/pairs/pairs.queries.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'
import { useModelNames } from './model-names.ts'
import { RefusedWrite } from './refused-write.tsx'
import { WeakeningNote } from './weakening-note.tsx'
import { useWhoMay } from './who-may.ts'

interface RemovePairProps {
  readonly system: string
  readonly pair: PairWire
  readonly evaluation: Evaluation | undefined
}

/** The way to remove a pair: first what that would do, then the decision. */
export function RemovePair(props: RemovePairProps) {
  const [isAsked, setAsked] = useState(false)
  const who = useWhoMay(props.system)
  return (
    <section className="border-t border-rule pt-16 pb-44">
      <h2 className="text-16 font-semibold">Remove it</h2>
      {!isAsked ? (
        <p className="mt-6 flex flex-wrap gap-x-28 gap-y-6">
          <span className="text-ink-soft">
            {who.is('maintainer')
              ? 'What it measures then is measured no longer; that is shown first.'
              : `Removing a pair takes a maintainer.${who.oneOf('maintainer')}`}
          </span>
          {who.is('maintainer') && (
            <WordButton onClick={() => setAsked(true)}>Remove the pair</WordButton>
          )}
        </p>
      ) : (
        <AskedRemoval {...props} onKeep={() => setAsked(false)} />
      )}
    </section>
  )
}

function AskedRemoval({
  system,
  pair,
  evaluation,
  onKeep,
}: RemovePairProps & { onKeep: () => void }) {
  const navigate = useNavigate()
  const names = useModelNames(system)
  const [message, setMessage] = useState('')
  const edits = useMemo(() => ({ pairs: { remove: [pair.id] } }), [pair.id])
  const tried = useTriedEffect(evaluation, edits)
  const weakenings = useMemo(
    () =>
      evaluation && tried.kind === 'measured'
        ? weakeningsBetween(evaluation.resolved, tried.evaluation.resolved)
        : [],
    [evaluation, tried],
  )
  const removing = useMutation({
    mutationFn: removePair,
    onSuccess: async () => {
      await navigate(paths.pairs(system))
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
    },
  })
  return (
    <>
      <p className="mt-6">{breachesInWords(tried)}</p>
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
        <WordButton
          onClick={() => removing.mutate({ system, id: pair.id, etag: pair.etag, message })}
          aria-busy={removing.isPending}
        >
          {removing.isPending ? 'Removing' : 'Remove it for good'}
        </WordButton>
        <WordButton onClick={onKeep}>Keep it</WordButton>
      </div>
      {removing.isError ? (
        <RefusedWrite refusal={writeRefusal(removing.error)} />
      ) : (
        <WeakeningNote system={system} weakenings={weakenings.map(({ detail }) => `${detail}.`)} />
      )}
    </>
  )
}

/** What removing does to the log. */
function breachesInWords(tried: TriedEffect): string {
  if (tried.kind !== 'measured') return ''
  const { goneBreaches } = tried.effect
  if (goneBreaches === 0) return 'No breach is open on it, so that the log stays as it is.'
  const many = startSentence(countOf(goneBreaches, 'open breach', 'open breaches'))
  return `${many} ${goneBreaches === 1 ? 'is' : 'are'} closed with the reason that the pair was removed, not fixed.`
}
