import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { Link, useNavigate } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { endSession, sessionQueries } from '#console/features/session/session.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'

/** The places of the top line that every page has. */
export function PlaceItems() {
  return (
    <>
      <li>
        <Link to={paths.systems()} className="hover:underline">
          Systems
        </Link>
      </li>
      <li>
        <a href={paths.apiReference()} className="hover:underline">
          API reference
        </a>
      </li>
    </>
  )
}

export function useMe() {
  return useSuspenseQuery(sessionQueries.me()).data
}

export function SignOutItem() {
  const navigate = useNavigate()
  const leaving = useMutation({
    mutationFn: endSession,
    onSettled: async () => {
      await navigate(paths.signIn())
      queryClient.clear()
    },
  })
  return (
    <button type="button" className="word" onClick={() => leaving.mutate()}>
      Sign out
    </button>
  )
}
