import { Link, useLocation } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import type { WriteRefusal } from '#console/lib/refusal.ts'
import { RefusalNote } from '#console/ui/refusal-note.tsx'

/** A write that was not taken, and where the session has ended the way to a new one beside this page. */
export function RefusedWrite({ refusal }: { refusal: WriteRefusal }) {
  const { pathname, search } = useLocation()
  return (
    <RefusalNote title={refusal.title} details={refusal.faults.map(({ detail }) => detail)}>
      {refusal.kind === 'signed-out' && (
        <>
          What you typed stands here as long as this page is open.{' '}
          <Link to={paths.signIn(pathname + search)} target="_blank" className="word-woad">
            Sign in beside it
          </Link>
          , then save again.
        </>
      )}
    </RefusalNote>
  )
}
