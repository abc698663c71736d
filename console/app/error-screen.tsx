import { Link, Navigate, useLocation, useRouteError } from 'react-router-dom'
import { isRefusal } from '#console/lib/api.ts'
import { WordButton } from '#console/ui/button.tsx'
import { DyewrightMark } from '#console/ui/dyewright-mark.tsx'
import { Trouble } from '#console/ui/page-states.tsx'
import { ApiError } from '#shared/client/client.ts'
import { paths } from './paths.ts'

/** What is shown where nothing of the console could be: what happened, and the ways on. */
export function ErrorScreen() {
  return (
    <main className="mr-16 ml-42 py-44 wide:mr-44 wide:ml-116">
      <DyewrightMark height={48} />
      <div className="mt-22">
        <PageTrouble />
      </div>
    </main>
  )
}

/** The same inside the frame of a system, which stays. */
export function PageTrouble() {
  const error = useRouteError()
  const { pathname, search } = useLocation()
  const { title, detail } = wordsFor(error)
  if (isRefusal(error, 401)) return <Navigate to={paths.signIn(pathname + search)} replace />
  return (
    <div className="py-22">
      <title>{`${title} · Dyewright`}</title>
      <Trouble title={title} level="h1">
        <p>{detail}</p>
        {error instanceof ApiError && error.problem !== undefined && (
          <p className="text-13 text-ink-soft">Request {error.problem.requestId}</p>
        )}
        <p className="flex gap-28">
          <WordButton onClick={() => window.location.reload()}>Try once more</WordButton>
          <Link to={paths.systems()} className="word">
            All systems
          </Link>
        </p>
      </Trouble>
    </div>
  )
}

function wordsFor(error: unknown): { title: string; detail: string } {
  if (error instanceof ApiError) {
    if (error.status === 404) {
      return {
        title: 'There is nothing here',
        detail: 'It was removed or renamed, or it belongs to a system you do not work on.',
      }
    }
    return {
      title: error.problem?.title ?? `The service answered ${error.status}`,
      detail: error.problem?.detail ?? 'Nothing was lost. It may answer in a moment.',
    }
  }
  if (error instanceof TypeError && /fetch|network/i.test(error.message)) {
    return {
      title: 'The service does not answer',
      detail: 'Either it is not running, or the way to it is cut. Nothing was lost.',
    }
  }
  return {
    title: 'This page has failed',
    detail: 'The fault is the console’s own. What you see elsewhere is not affected.',
  }
}
