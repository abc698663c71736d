import {
  type LoaderFunctionArgs,
  Outlet,
  redirect,
  ScrollRestoration,
  useNavigation,
} from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { sessionQueries } from '#console/features/session/session.queries.ts'
import { isRefusal } from '#console/lib/api.ts'
import { queryClient } from '#console/lib/query-client.ts'

export async function loader({ request }: LoaderFunctionArgs) {
  try {
    return await queryClient.ensureQueryData(sessionQueries.me())
  } catch (error) {
    if (!isRefusal(error, 401)) throw error
    const { pathname, search } = new URL(request.url)
    throw redirect(paths.signIn(pathname + search))
  }
}

/** Everything that takes a session. */
export function Component() {
  return (
    <>
      <a
        href="#content"
        className="sr-only z-30 bg-ink px-16 py-8 text-ground focus:not-sr-only focus:fixed focus:top-8 focus:left-116"
      >
        To the content
      </a>
      <Opening />
      <Outlet />
      <ScrollRestoration />
    </>
  )
}

/** A line along the top while the next page is fetched; not seen where that takes no time. */
function Opening() {
  const isOpening = useNavigation().state === 'loading'
  return (
    <div role="status" className="fixed inset-x-0 top-0 z-30 overflow-hidden">
      {isOpening && (
        <div className="after-a-while">
          <span className="sr-only">Opening</span>
          <div className="waiting-line h-2 w-1/4 bg-ink" />
        </div>
      )}
    </div>
  )
}
