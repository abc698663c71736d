import { useSuspenseQuery } from '@tanstack/react-query'
import { useEffect, useRef } from 'react'
import { Link, type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { pairTitle } from '#console/features/pairs/pair-words.ts'
import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { NothingHere } from '#console/ui/page-states.tsx'
import { ApiError } from '#shared/client/client.ts'
import { useEvaluation } from './evaluation.ts'
import { OpenedPair } from './opened-pair.tsx'
import { useFrame } from './system-frame.tsx'

export async function loader({ params: { system = '', id } }: LoaderFunctionArgs) {
  const isThere = (pairs: readonly { readonly id: string }[]) =>
    pairs.some((pair) => pair.id === id)
  const [pairs] = await Promise.all([
    queryClient.ensureQueryData(pairQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.all(system)),
  ])
  if (isThere(pairs)) return null
  const again = await queryClient.fetchQuery({ ...pairQueries.all(system), staleTime: 0 })
  if (!isThere(again)) throw new ApiError(404, undefined)
  return null
}

/** One pair: what it measures in every theme and state, try an edit, save it, remove it. */
export function Component() {
  const { system = '', id = '' } = useParams()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: pairs } = useSuspenseQuery(pairQueries.all(system))
  const evaluation = useEvaluation(system, settings.head.revision)
  const pair = pairs.find((each) => each.id === id)
  const title = useRef<HTMLHeadingElement>(null)
  const { lead } = useFrame()
  const foreground = pair?.foreground
  useEffect(() => {
    const element = title.current
    lead(element === null || foreground === undefined ? undefined : { name: foreground, element })
    return () => lead(undefined)
  }, [lead, foreground])
  if (pair === undefined) {
    return (
      <NothingHere title="This pair is declared no longer.">
        <Link to={paths.pairs(system)} className="word-woad">
          To the pairs that are
        </Link>
      </NothingHere>
    )
  }
  return (
    <>
      <title>{`${pairTitle(pair)} · ${system} · Dyewright`}</title>
      <OpenedPair
        key={pair.id}
        system={system}
        pair={pair}
        evaluation={evaluation.data}
        title={title}
      />
    </>
  )
}
