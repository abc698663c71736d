import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link, type LoaderFunctionArgs, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import {
  distinctSetQueries,
  removeSet,
} from '#console/features/distinct-sets/distinct-sets.queries.ts'
import { SetMeasures } from '#console/features/distinct-sets/set-measures.tsx'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere, Waiting } from '#console/ui/page-states.tsx'
import type { DistinctSetWire } from '#shared/contracts/distinct-sets.contract.ts'
import { DistinctSetForm } from './distinct-set-form.tsx'
import { PairViews } from './pair-views.tsx'
import { RefusedWrite } from './refused-write.tsx'
import { useSetMeasures } from './set-measures.ts'
import { useTokenCells } from './token-cells.tsx'
import { useWhoMay } from './who-may.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(distinctSetQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.list(system)),
  ])
  return null
}

/** Where a set is opened in the address, the word for one that is not made yet. */
const NEW = 'new'

/** The distinct sets of a system, each with the couples hardest to tell apart; the opened one is edited. */
export function Component() {
  const { system = '' } = useParams()
  const { data: sets } = useSuspenseQuery(distinctSetQueries.all(system))
  const [search, setSearch] = useSearchParams()
  const opened = search.get('set')
  const open = (id: string) => setSearch({ set: id }, { preventScrollReset: true })
  return (
    <>
      <title>{`Distinct sets of ${system} · Dyewright`}</title>
      <PairViews system={system} />
      <p className="max-w-720 pt-14 text-ink-soft">
        Tokens that must stay tellable apart, also with a colour-vision deficiency: the closest two
        of each set by CIEDE2000, at rest on the ground of each theme. Reported with every check,
        gating none.
      </p>
      {sets.length === 0 && <NothingHere title="No distinct set is made yet." />}
      {sets.map((set) => (
        <section key={set.id} aria-label={set.name} className="border-b border-rule pt-22 pb-18">
          <h2 className="text-16 font-semibold">{set.name}</h2>
          {opened === set.id ? (
            <OpenedSet system={system} set={set} onSaved={open} />
          ) : (
            <ReadSet system={system} set={set} />
          )}
        </section>
      ))}
      <section className="pt-22 pb-44">
        <h2 className="text-16 font-semibold">Make a set</h2>
        {opened === NEW ? (
          <DistinctSetForm system={system} set={undefined} onSaved={open} />
        ) : (
          <p className="mt-6">
            <Link to={paths.distinctSets(system, NEW)} preventScrollReset className="word">
              Choose its tokens
            </Link>
          </p>
        )}
      </section>
    </>
  )
}

/** A set as it stands: its colours, and its closest couples. */
function ReadSet({ system, set }: { system: string; set: DistinctSetWire }) {
  const cellOf = useTokenCells(system)
  const measures = useSetMeasures(system)(set.tokens)
  return (
    <>
      <ul aria-label={`Tokens of ${set.name}`} className="mt-10 flex flex-wrap gap-x-22 gap-y-10">
        {set.tokens.map((name) => (
          <li key={name} className="min-w-0">
            {cellOf(name)}
            <Link to={paths.token(system, name)} className="mt-2 block text-13 break-words">
              {name}
            </Link>
          </li>
        ))}
      </ul>
      {measures.length === 0 ? (
        <Waiting>Measuring the head</Waiting>
      ) : (
        <SetMeasures label={`Closest couples of ${set.name}`} measures={measures} />
      )}
      <p className="mt-12">
        <Link
          to={paths.distinctSets(system, set.id)}
          preventScrollReset
          aria-label={`Edit ${set.name}`}
          className="word"
        >
          Edit
        </Link>
      </p>
    </>
  )
}

function OpenedSet({
  system,
  set,
  onSaved,
}: {
  system: string
  set: DistinctSetWire
  onSaved: (id: string) => void
}) {
  const who = useWhoMay(system)
  return (
    <>
      <DistinctSetForm system={system} set={set} onSaved={onSaved} />
      <div className="mt-12 flex flex-wrap gap-x-28 gap-y-6">
        <Link to={paths.distinctSets(system)} preventScrollReset className="word">
          Close
        </Link>
        {who.is('maintainer') && <RemoveSet system={system} set={set} />}
      </div>
    </>
  )
}

/** Asked once more before it goes; its tokens stay. */
function RemoveSet({ system, set }: { system: string; set: DistinctSetWire }) {
  const [isAsked, setAsked] = useState(false)
  const removing = useMutation({
    mutationFn: removeSet,
    onSettled: () => queryClient.invalidateQueries({ queryKey: ['system', system] }),
  })
  if (!isAsked) return <WordButton onClick={() => setAsked(true)}>Remove the set</WordButton>
  return (
    <>
      <WordButton onClick={() => !removing.isPending && removing.mutate({ system, set })}>
        Remove it for good, its tokens stay
      </WordButton>
      <WordButton onClick={() => setAsked(false)}>Keep it</WordButton>
      {removing.isError && <RefusedWrite refusal={writeRefusal(removing.error)} />}
    </>
  )
}
