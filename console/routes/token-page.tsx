import { useSuspenseQuery } from '@tanstack/react-query'
import { useEffect, useRef } from 'react'
import { type LoaderFunctionArgs, useLocation, useParams } from 'react-router-dom'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { lastSegment } from '#console/lib/last-segment.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { Trouble, Waiting } from '#console/ui/page-states.tsx'
import { ApiError } from '#shared/client/client.ts'
import { useEvaluation } from './evaluation.ts'
import { OpenedToken } from './opened-token.tsx'
import { useFrame } from './system-frame.tsx'

export async function loader({ params: { system = '' }, request }: LoaderFunctionArgs) {
  const name = lastSegment(new URL(request.url).pathname)
  const [tokens] = await Promise.all([
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(tokenQueries.one(system, name)),
  ])
  if (!tokens.some((token) => token.name === name)) {
    await queryClient.invalidateQueries({ queryKey: ['system', system] })
    const again = await queryClient.fetchQuery(tokenQueries.ledger(system))
    if (!again.some((token) => token.name === name)) throw new ApiError(404, undefined)
  }
  return null
}

export function Component() {
  const { system = '' } = useParams()
  const name = lastSegment(useLocation().pathname)
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: token } = useSuspenseQuery(tokenQueries.one(system, name))
  const evaluation = useEvaluation(system, settings.head.revision)
  const title = useRef<HTMLHeadingElement>(null)
  const { lead } = useFrame()
  useEffect(() => {
    const element = title.current
    lead(element === null ? undefined : { name, element })
    return () => lead(undefined)
  }, [lead, name])
  return (
    <>
      <title>{`${name} · ${system} · Dyewright`}</title>
      <OpenedToken
        key={token.id}
        system={system}
        token={token}
        title={title}
        evaluation={evaluation.data}
      >
        {evaluation.isPending && <Waiting>Measuring every pair of the head</Waiting>}
        {evaluation.isError && (
          <Trouble title="The pairs cannot be measured here.">
            <p>{evaluation.error.message}</p>
          </Trouble>
        )}
      </OpenedToken>
    </>
  )
}
