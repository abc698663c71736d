import type { ReactNode } from 'react'
import { Link, useLocation } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import type { WriteRefusal } from '#console/lib/refusal.ts'
import { RefusalNote } from '#console/ui/refusal-note.tsx'

/** A write that was not taken, and where the session has ended the way to a new one. */
export function RefusedWrite({
  refusal,
  signIn = <SignInBeside />,
}: {
  refusal: WriteRefusal
  /** The way to a new session, and what comes of what was typed. */
  signIn?: ReactNode
}) {
  return (
    <RefusalNote title={refusal.title} details={refusal.faults.map(({ detail }) => detail)}>
      {refusal.kind === 'signed-out' && signIn}
    </RefusalNote>
  )
}

function SignInBeside() {
  const { pathname, search } = useLocation()
  return (
    <>
      What you typed stands here as long as this page is open.{' '}
      <Link to={paths.signIn(pathname + search)} target="_blank" className="word-woad">
        Sign in beside it
      </Link>
      , then save again.
    </>
  )
}
