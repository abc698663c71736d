import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { type LoaderFunctionArgs, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { readPairAddress } from '#console/features/pairs/pair-address.ts'
import { EMPTY_PAIR } from '#console/features/pairs/pair-draft.ts'
import { declarePair, pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'
import { type PairEdit, usePairEdit } from './pair-edit.ts'
import { PairMembers } from './pair-members.tsx'
import { RefusedWrite } from './refused-write.tsx'
import { WeakeningNote } from './weakening-note.tsx'
import { useWhoMay } from './who-may.ts'
import { WouldMeasure } from './would-measure.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(pairQueries.all(system)),
    queryClient.ensureQueryData(memberQueries.all(system)),
  ])
  return null
}

const NEW_PAIR = 'new-pair'

/** A pair to be declared; the address may say what stands on what already. */
export function Component() {
  const { system = '' } = useParams()
  const [search] = useSearchParams()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: evaluation } = useEvaluation(system, settings.head.revision)
  const [start] = useState(() => readPairAddress(search))
  const edit = usePairEdit({ id: NEW_PAIR, standing: EMPTY_PAIR }, evaluation, start)
  const names = useModelNames(system)
  return (
    <>
      <title>{`New pair of ${system} · Dyewright`}</title>
      <h2 className="pt-18 pb-12 text-16 font-semibold">A new pair</h2>
      <DeclareForm system={system} edit={edit} />
      <div className="grid gap-x-44 full:grid-cols-2">
        <EffectOnVerdicts tried={edit.tried} names={names} />
        <WouldMeasure id={NEW_PAIR} tried={edit.tried} names={names} />
      </div>
    </>
  )
}

function DeclareForm({ system, edit }: { system: string; edit: PairEdit }) {
  const navigate = useNavigate()
  const [message, setMessage] = useState('')
  const obstacle = useObstacle(system, edit)
  const declaring = useMutation({
    mutationFn: declarePair,
    onSuccess: async ({ id }) => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      await navigate(paths.pair(system, id))
    },
  })
  const refusal = declaring.isError ? writeRefusal(declaring.error) : undefined
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (obstacle !== undefined || declaring.isPending || edit.input === undefined) return
    declaring.mutate({ system, input: edit.input, message })
  }
  return (
    <form onSubmit={submit} className="border-b border-ink pb-18">
      <PairMembers system={system} edit={edit} refusal={refusal} />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={edit.isEdited}
        isSaving={declaring.isPending}
        obstacle={obstacle}
        action="Declare the pair"
        onPutBack={() => {
          declaring.reset()
          edit.putBack()
        }}
      />
      {refusal === undefined && <WeakeningNote system={system} weakenings={edit.weakenings} />}
      {refusal !== undefined && <RefusedWrite refusal={refusal} />}
    </form>
  )
}

/** Why it cannot be declared just now, in a sentence or two. */
function useObstacle(system: string, edit: PairEdit): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer', 'accessibility-lead')) {
    return `Trying is for everyone; declaring takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  const [fault] = edit.faults
  if (fault !== undefined) return `${fault.detail.replace(/\.$/, '')}.`
  if (edit.tried.kind === 'unresolvable') return 'The colours cannot be resolved with this pair.'
  const isExempt = edit.fields.exempt !== 'none'
  if (isExempt && !who.is('accessibility-lead')) {
    return `Exempting a pair takes the accessibility lead.${who.oneOf('accessibility-lead')}`
  }
  if (!isExempt && !who.is('maintainer')) {
    return `An accessibility lead declares exempt pairs only; the rest takes a maintainer.${who.oneOf('maintainer')}`
  }
  return undefined
}
