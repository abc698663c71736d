import { useSuspenseQuery } from '@tanstack/react-query'
import { type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { ApiError } from '#shared/client/client.ts'
import { useEvaluation } from './evaluation.ts'
import { OpenedTheme } from './opened-theme.tsx'

export async function loader({ params: { system = '', theme: key } }: LoaderFunctionArgs) {
  const [themes] = await Promise.all([
    queryClient.ensureQueryData(themeQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.all(system)),
  ])
  if (!themes.some((theme) => theme.key === key)) throw new ApiError(404, undefined)
  return null
}

/** One theme: try an edit, see what it moves, save it. */
export function Component() {
  const { system = '', theme: key = '' } = useParams()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const evaluation = useEvaluation(system, settings.head.revision)
  const theme = themes.find((each) => each.key === key)
  if (theme === undefined) throw new ApiError(404, undefined)
  return (
    <>
      <title>{`Theme ${key} of ${system} · Dyewright`}</title>
      <OpenedTheme key={theme.id} system={system} theme={theme} evaluation={evaluation.data} />
    </>
  )
}
