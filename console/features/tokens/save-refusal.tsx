import type { ReactNode } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { ApiError } from '#shared/client/client.ts'

/** Faults of a refused save by the field that they belong to; the rest stands in `others`. */
export interface SaveFaults {
  readonly value?: string
  readonly message?: string
  readonly others: readonly string[]
}

export function saveFaults(error: Error | null): SaveFaults {
  if (!(error instanceof ApiError)) return { others: [] }
  const faults = error.problem?.errors ?? []
  const at = (start: string) => faults.find(({ pointer }) => pointer?.startsWith(start))?.detail
  const [value, message] = [at('/value'), at('/message')]
  return {
    ...(value === undefined ? {} : { value }),
    ...(message === undefined ? {} : { message }),
    others: faults
      .filter(({ pointer }) => !/^\/(value|message)/.test(pointer ?? ''))
      .map(({ detail }) => detail),
  }
}

/** A save that was refused, or that met a token which had changed meanwhile; what was typed stays. */
export function SaveRefusal({
  error,
  now,
  signIn,
  onAgain,
}: {
  error: Error
  /** What the token is set to now, in words. */
  now: string
  /** The way to a new session, and back to what was typed. */
  signIn: ReactNode
  onAgain: () => void
}) {
  if (error instanceof ApiError && error.status === 401) {
    return (
      <div role="alert" className="mt-14 border-t border-ink pt-10">
        <p>
          <span className="font-semibold">Your session has ended, nothing was saved.</span> What you
          typed is kept. {signIn}
        </p>
      </div>
    )
  }
  if (error instanceof ApiError && error.status === 412) {
    return (
      <div role="alert" className="mt-14 border-t border-ink pt-10">
        <p>
          <span className="font-semibold">The token has changed since you opened it.</span> It is{' '}
          {now} now. What you typed is kept, and is measured against that.{' '}
          <WordButton onClick={onAgain}>Save it all the same</WordButton>
        </p>
      </div>
    )
  }
  const title =
    error instanceof ApiError
      ? (error.problem?.detail ?? error.problem?.title ?? `The service answered ${error.status}`)
      : 'The service does not answer. What you typed is kept; try once more'
  return (
    <div role="alert" className="mt-14 border-t border-ink pt-10">
      <p className="font-semibold">{title.replace(/\.?$/, '.')}</p>
      {saveFaults(error).others.map((detail) => (
        <p key={detail}>{detail}</p>
      ))}
    </div>
  )
}
