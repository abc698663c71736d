import { useMutation, useQuery, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { Link, useLocation } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { mayDo } from '#console/features/session/session.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import type { KeptTrial } from '#console/features/tokens/kept-trial.ts'
import { valueInWords } from '#console/features/tokens/present-value.ts'
import { SavedNote } from '#console/features/checks/saved-note.tsx'
import { saveToken } from '#console/features/tokens/tokens.queries.ts'
import type { TrialReading } from '#console/features/tokens/trial.ts'
import { type PresentColor, TrialFields } from '#console/features/tokens/trial-fields.tsx'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { TwoVersions } from '#console/ui/two-versions.tsx'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import { useMe } from './account-items.tsx'
import { RefusedWrite } from './refused-write.tsx'

interface SaveFormProps {
  readonly system: string
  readonly token: TokenWire
  readonly text: string
  readonly reading: TrialReading
  readonly present: PresentColor
  readonly base: string
  readonly isTried: boolean
  /** The message of a trial that was kept. */
  readonly keptMessage: string
  readonly onText: (text: string) => void
  readonly onPutBack: () => void
}

/** The fields of the trial, and the decision to save it. */
export function SaveForm(props: SaveFormProps) {
  const { system, token, text, reading, present, base, isTried, onText, onPutBack } = props
  const [message, setMessage] = useState(props.keptMessage)
  const obstacle = useObstacle(props)
  const saving = useMutation({
    mutationFn: saveToken,
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      setMessage('')
      onPutBack()
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
    saving.mutate({ system, name: token.name, etag: token.etag, value: text.trim(), message })
  }

  function submit(event: FormEvent) {
    event.preventDefault()
    save()
  }

  function takeText(next: string) {
    if (!saving.isIdle && !saving.isPending && !isRefusal(saving.error, 412)) saving.reset()
    onText(next)
  }

  const putBack = () => {
    saving.reset()
    onPutBack()
  }

  return (
    <form onSubmit={submit} className="border-b border-ink pb-18">
      <TrialFields
        text={text}
        reading={reading}
        present={present}
        fault={faultAt(refusal, '/value')}
        onText={takeText}
      />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={isTried}
        isSaving={saving.isPending}
        obstacle={obstacle}
        onPutBack={putBack}
      />
      {refusal?.kind === 'changed' && (
        <TwoVersions
          title="Somebody has saved this token since you opened it. What you typed is kept, and is measured against what is there now."
          rows={[{ member: 'Colour', now: valueInWords(token, base), yours: text.trim() }]}
          onKeepYours={save}
          onTakeTheirs={putBack}
        />
      )}
      {refusal !== undefined && refusal.kind !== 'changed' && (
        <RefusedWrite
          refusal={refusal}
          signIn={<SignInAgain kept={{ token: token.id, text, message }} />}
        />
      )}
      {saving.isSuccess && <SavedNote saved={saving.data} />}
    </form>
  )
}

/** To signing in, and back to this page with what was typed. */
function SignInAgain({ kept }: { kept: KeptTrial }) {
  const { pathname, search } = useLocation()
  return (
    <>
      What you typed is kept.{' '}
      <Link to={paths.signIn(pathname + search)} state={{ kept }} className="word-woad">
        Sign in and come back to it
      </Link>
    </>
  )
}

/** Why nothing can be saved just now, in a sentence or two. */
function useObstacle({ system, token, reading, isTried }: SaveFormProps): string | undefined {
  const me = useMe()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const mayWrite = mayDo(me, system, 'tokens:write')
  const { data: members = [] } = useQuery({ ...memberQueries.all(system), enabled: !mayWrite })
  if (!mayWrite) {
    const maintainer = members.find(({ role }) => role === 'maintainer')
    const named = maintainer === undefined ? '' : ` ${maintainer.name} is one.`
    return `Trying is for everyone; saving takes a maintainer.${named}`
  }
  if (token.locked) return 'This token is locked.'
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (reading.kind === 'unread') return 'What is written is not a colour.'
  return isTried ? undefined : 'Nothing is tried yet.'
}
